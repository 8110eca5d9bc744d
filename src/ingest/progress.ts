import type { Progress } from '../records.js';
import type { FileTally } from './tally.js';

/** Tells the progress of reading a file by its bytes; the total is not known of a compressed one. */
export async function byteProgress(tally: FileTally, progress: Progress): Promise<(bytes: number) => void> {
  const { source } = tally;
  tally.digest = await source.digest();
  const total = source.name.endsWith('.gz') ? 0 : tally.digest.bytes;
  let done = 0;
  return (bytes) => {
    done += bytes;
    progress(`reading ${source.name}`, done, total);
  };
}
