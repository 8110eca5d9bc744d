/** Reproducible random numbers: xoshiro128** (Blackman & Vigna 2018), seeded by words of any kind. */
export interface Random {
  /** Uniform on (0, 1), 2^-53 apart; never 0 or 1. */
  readonly uniform: () => number;
}

/** A generator whose stream depends on all the words given and on nothing else. */
export function randomStream(...words: readonly (string | number)[]): Random {
  const state = seedState(words.join('\u0000'));
  let [a, b, c, d] = [state[0] as number, state[1] as number, state[2] as number, state[3] as number];
  const next = (): number => {
    const product = Math.imul(b, 5);
    const result = Math.imul((product << 7) | (product >>> 25), 9) >>> 0;
    const t = b << 9;
    c ^= a;
    d ^= b;
    b ^= c;
    a ^= d;
    c ^= t;
    d = (d << 11) | (d >>> 21);
    return result;
  };
  const uniform = (): number => {
    const high = next() >>> 5;
    const low = next() >>> 6;
    return (high * 67108864 + low + 0.5) / 9007199254740992;
  };
  return { uniform };
}

/** Standard normal, by the polar method of Marsaglia & Bray (1964), one of its pair. */
export function normalDraw(random: Random): number {
  for (;;) {
    const u = 2 * random.uniform() - 1;
    const v = 2 * random.uniform() - 1;
    const s = u * u + v * v;
    if (s > 0 && s < 1) return u * Math.sqrt((-2 * Math.log(s)) / s);
  }
}

/** Gamma with the given shape (> 0) and scale 1 (Marsaglia & Tsang 2000). */
export function gammaDraw(random: Random, shape: number): number {
  if (shape === 1) return -Math.log(random.uniform());
  if (shape < 1) return gammaDraw(random, shape + 1) * random.uniform() ** (1 / shape);
  const d = shape - 1 / 3;
  const c = 1 / Math.sqrt(9 * d);
  for (;;) {
    const x = normalDraw(random);
    const v = (1 + c * x) ** 3;
    if (v <= 0) continue;
    if (Math.log(random.uniform()) < 0.5 * x * x + d - d * v + d * Math.log(v)) return d * v;
  }
}

/** FNV-1a over the text's code units, then splitmix32 for four words of state. */
function seedState(text: string): number[] {
  let hash = 0x811c9dc5;
  let other = 0x1b873593;
  for (let i = 0; i < text.length; i++) {
    hash = Math.imul(hash ^ text.charCodeAt(i), 0x01000193);
    other = Math.imul(other ^ text.charCodeAt(i), 0x85ebca6b) + hash;
  }
  const words: number[] = [];
  for (let i = 0; i < 4; i++) {
    hash = (hash + 0x9e3779b9) | 0;
    let z = hash ^ (i % 2 === 0 ? 0 : other);
    z = Math.imul(z ^ (z >>> 16), 0x85ebca6b);
    z = Math.imul(z ^ (z >>> 13), 0xc2b2ae35);
    words.push(z ^ (z >>> 16));
  }
  return words;
}
