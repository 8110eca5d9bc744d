/**
 * Returnfall as a library: pure functions from records to forecast and report. What touches files and threads is in
 * `returnfall/node`; a program brings its own effects or takes those.
 */

export { type Config, type CostPerReturn, type InputConfig, type ProductRules, rulesOf } from './config.js';
export { describeFault, exitCodes, type Fault, UserError } from './errors.js';
export { cellProbability, type Life, survivorProbability } from './exposure/probability.js';
export { type Family, freeOf } from './families/family.js';
export { families, familyNamed, familyNames } from './families/index.js';
export { jsonText } from './ledger/json.js';
export { outputFiles } from './ledger/outputs.js';
export { reopen } from './ledger/reopen.js';
export { type RunFacts, runDocument } from './ledger/run.js';
export { type Effects, monthEnd, type TaskName, type Tasks, tasks, type Until } from './pipeline.js';
export { intervalKeys, quantileKey } from './quantiles.js';
export type * from './records.js';
export { type ReportInput, renderReport } from './report/report.js';
export { type Flags, readSettings, resolveConfig, type SettingsFile } from './settings.js';
