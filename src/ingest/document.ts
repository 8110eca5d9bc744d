import type { Config } from '../config.js';
import type { Intake, IntakeDocument } from '../records.js';

export function intakeDocument(_config: Config, _intake: Intake): IntakeDocument {
  throw new Error('being written');
}
