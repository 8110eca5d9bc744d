/**
 * Fingerprints of serial numbers, 8 bytes each, spread over buckets so that looking for equals needs little more. Two serials
 * may share a fingerprint (among five million about once in a thousand runs), so equals are only suspects.
 */
export interface Fingerprints {
  readonly add: (print: number) => void;
  /** Fingerprints that came more than once. The store is empty afterwards. */
  readonly takeRepeated: () => ReadonlySet<number>;
}

const bucketCount = 256;
const chunkLength = 1024;

interface Bucket {
  readonly chunks: Float64Array[];
  count: number;
}

export function newFingerprints(): Fingerprints {
  const buckets = Array.from({ length: bucketCount }, (): Bucket => ({ chunks: [], count: 0 }));
  return {
    add(print) {
      const bucket = buckets[print & (bucketCount - 1)] as Bucket;
      const place = bucket.count % chunkLength;
      if (place === 0) bucket.chunks.push(new Float64Array(chunkLength));
      (bucket.chunks[bucket.chunks.length - 1] as Float64Array)[place] = print;
      bucket.count++;
    },
    takeRepeated() {
      const found = new Set<number>();
      for (const bucket of buckets) findRepeated(bucket, found);
      return found;
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

/** Adds what a bucket holds more than once to `found`, and empties it. */
function findRepeated(bucket: Bucket, found: Set<number>): void {
  const sorted = new Float64Array(bucket.count);
  bucket.chunks.forEach((chunk, i) => {
    const start = i * chunkLength;
    sorted.set(chunk.subarray(0, bucket.count - start), start);
  });
  bucket.chunks.length = 0;
  bucket.count = 0;
  sorted.sort();
  for (let i = 1; i < sorted.length; i++) {
    if (sorted[i] === sorted[i - 1]) found.add(sorted[i] as number);
  }
}
