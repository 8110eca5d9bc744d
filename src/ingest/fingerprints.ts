/**
 * Serial numbers of which only a fingerprint is kept: 8 bytes a unit while reading and 16 while looking for equals. Two
 * serials may share a fingerprint (among five million about once in a thousand runs), so equals are only suspects.
 */
export interface Fingerprints {
  readonly add: (serial: string) => void;
  /** Fingerprints that came more than once. The store is empty afterwards. */
  readonly takeRepeated: () => ReadonlySet<number>;
}

const chunkLength = 1 << 16;

export function newFingerprints(): Fingerprints {
  let chunks: Float64Array[] = [];
  let count = 0;
  return {
    add(serial) {
      const place = count % chunkLength;
      if (place === 0) chunks.push(new Float64Array(chunkLength));
      (chunks[chunks.length - 1] as Float64Array)[place] = fingerprint(serial);
      count++;
    },
    takeRepeated() {
      const all = new Float64Array(count);
      chunks.forEach((chunk, i) => {
        all.set(chunk.subarray(0, Math.min(chunkLength, count - i * chunkLength)), i * chunkLength);
      });
      chunks = [];
      count = 0;
      return repeated(all.sort());
    },
  };
}

/**
 * A whole number below 2^53 for a serial: two 32-bit multiplicative hashes, each finished as in MurmurHash3 (A. Appleby,
 * fmix32, constants from memory), 21 bits of one above 32 of the other.
 */
export function fingerprint(serial: string): number {
  let a = 0x811c9dc5;
  let b = 0x9e3779b9;
  for (let i = 0; i < serial.length; i++) {
    const unit = serial.charCodeAt(i);
    a = Math.imul(a ^ unit, 0x01000193);
    b = Math.imul(b ^ unit, 0x85ebca6b);
    b ^= b >>> 15;
  }
  return (mixed(b) & 0x1fffff) * 0x1_0000_0000 + mixed(a ^ serial.length);
}

function mixed(hash: number): number {
  let h = hash;
  h = Math.imul(h ^ (h >>> 16), 0x85ebca6b);
  h = Math.imul(h ^ (h >>> 13), 0xc2b2ae35);
  return (h ^ (h >>> 16)) >>> 0;
}

function repeated(sorted: Float64Array): Set<number> {
  const found = new Set<number>();
  for (let i = 1; i < sorted.length; i++) {
    if (sorted[i] === sorted[i - 1]) found.add(sorted[i] as number);
  }
  return found;
}
