import type { Progress, Source } from '../records.js';

/** Tells the progress of reading a file by its bytes; the total is not known of a compressed one. */
export async function byteProgress(source: Source, progress: Progress): Promise<(bytes: number) => void> {
  const total = source.name.endsWith('.gz') ? 0 : (await source.digest()).bytes;
  let done = 0;
  return (bytes) => {
    done += bytes;
    progress(`reading ${source.name}`, done, total);
  };
}
