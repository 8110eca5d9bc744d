/**
 * Counts what vitest wrote: node .ci/count.mjs results.json exit-code [expected skip…]
 * Prints what failed and what was skipped without being expected, then `N passed, N failed, N skipped`. A file that could
 * not be loaded counts as one failure, and so does an exit code that no failed test explains.
 */
import { readFileSync } from 'node:fs';
import { relative } from 'node:path';

const [file, exitCode, ...expectedSkips] = process.argv.slice(2);
const results = JSON.parse(readFileSync(file, 'utf8')).testResults.map((suite) => ({
  ...suite,
  path: relative(process.cwd(), suite.name).replaceAll('\\', '/'),
}));
const tests = results.flatMap((suite) =>
  suite.assertionResults.map((test) => ({ ...test, path: suite.path })),
);
const unloaded = results.filter(
  (suite) => suite.status === 'failed' && suite.assertionResults.every((test) => test.status !== 'failed'),
);
const passed = tests.filter((test) => test.status === 'passed');
const failed = tests.filter((test) => test.status === 'failed');
const skipped = tests.filter((test) => test.status !== 'passed' && test.status !== 'failed');
const unexpected = skipped.filter(
  (test) =>
    !expectedSkips.some(
      (skip) => test.fullName === skip || (skip.endsWith('/') && test.path.startsWith(skip)),
    ),
);

for (const test of failed) console.log(`failed: ${test.path}: ${test.fullName}`);
for (const suite of unloaded) console.log(`failed: ${suite.path}: ${suite.message.split('\n')[0]}`);
for (const test of unexpected) console.log(`skipped without being expected: ${test.path}: ${test.fullName}`);

let failures = failed.length + unloaded.length;
if (failures === 0 && exitCode !== '0') {
  failures = 1;
  console.log(`failed: npm test ended with ${exitCode} although no test failed`);
}
console.log(`${passed.length} passed, ${failures} failed, ${skipped.length} skipped`);
process.exitCode = failures > 0 || unexpected.length > 0 || passed.length === 0 ? 1 : 0;
