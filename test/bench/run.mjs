/** Every benchmark in turn, each in a process of its own. Figures are ratios within one run; nothing is asserted. */
import { execFileSync } from 'node:child_process';

for (const name of ['fit', 'ingest']) {
  console.log(`== ${name}`);
  execFileSync(process.execPath, [new URL(`${name}.mjs`, import.meta.url).pathname], { stdio: 'inherit' });
}
