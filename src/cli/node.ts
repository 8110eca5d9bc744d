/** What a program on Node needs besides the pure library: files, standard input, threads, templates, output folders. */
export { type NodeEffects, type NodeEffectsOptions, nodeEffects } from './effects.js';
export { type OutputFolder, openOutput, repairOutput } from './output.js';
export { openScope, type Scope } from './scope.js';
