import { spawnSync } from 'node:child_process';
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';

const root = fileURLToPath(new URL('..', import.meta.url));

describe('the count of tests that ends a checked run', () => {
  let folder = '';
  beforeAll(() => {
    folder = mkdtempSync(join(tmpdir(), 'count-'));
  });
  afterAll(() => rmSync(folder, { recursive: true }));

  /** Last line and exit code for one test of each status, of files by name. */
  function count(
    statuses: Readonly<Record<string, readonly string[]>>,
    exitCode = '0',
    skips: string[] = [],
  ) {
    const testResults = Object.entries(statuses).map(([path, list]) => ({
      name: join(root, path),
      status: list.length === 0 || list.includes('failed') ? 'failed' : 'passed',
      message: 'cannot be loaded',
      assertionResults: list.map((status) => ({ status, fullName: `a test that ${status}` })),
    }));
    const file = join(folder, 'results.json');
    writeFileSync(file, JSON.stringify({ testResults }));
    const args = [join(root, '.ci/count.mjs'), file, exitCode, ...skips];
    const { stdout, status } = spawnSync(process.execPath, args, { cwd: root, encoding: 'utf8' });
    return [stdout.trimEnd().split('\n').at(-1), status];
  }

  it('passes when every test has passed', () => {
    expect(count({ 'test/a.test.ts': ['passed', 'passed'] })).toEqual(['2 passed, 0 failed, 0 skipped', 0]);
  });

  it('fails on a failed test, a file that cannot be loaded and an exit code without a failure', () => {
    const failed = { 'test/a.test.ts': ['passed', 'failed'] };
    expect(count(failed, '1')).toEqual(['1 passed, 1 failed, 0 skipped', 1]);
    const unloaded = { 'test/a.test.ts': ['passed'], 'test/b.test.ts': [] };
    expect(count(unloaded, '1')).toEqual(['1 passed, 1 failed, 0 skipped', 1]);
    expect(count({ 'test/a.test.ts': ['passed'] }, '1')).toEqual(['1 passed, 1 failed, 0 skipped', 1]);
    expect(count({})).toEqual(['0 passed, 0 failed, 0 skipped', 1]);
  });

  it('lets only those skips pass that are expected', () => {
    const skipped = { 'test/a.test.ts': ['passed'], 'test/real/b.test.ts': ['pending'] };
    expect(count(skipped)).toEqual(['1 passed, 0 failed, 1 skipped', 1]);
    expect(count(skipped, '0', ['test/real/'])).toEqual(['1 passed, 0 failed, 1 skipped', 0]);
    expect(count(skipped, '0', ['a test that pending'])).toEqual(['1 passed, 0 failed, 1 skipped', 0]);
    expect(count(skipped, '0', ['test/cases/', 'a test'])).toEqual(['1 passed, 0 failed, 1 skipped', 1]);
    const todo = { 'test/a.test.ts': ['passed', 'todo'] };
    expect(count(todo)).toEqual(['1 passed, 0 failed, 1 skipped', 1]);
  });
});
