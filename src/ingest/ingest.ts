import type { Config } from '../config.js';
import type { Intake, Progress, Sources } from '../records.js';

export async function ingest(_config: Config, _sources: Sources, _progress: Progress): Promise<Intake> {
  throw new Error('being written');
}
