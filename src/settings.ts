/** The settings of a run: the settings file and the flags, checked against one description of the keys, made complete. */
export { readSettings, type SettingsFile } from './settings/file.js';
export type { Flags } from './settings/flags.js';
export { resolveConfig } from './settings/resolve.js';
export { overrideStored, readStoredConfig } from './settings/stored.js';
