import { describe, expect, it } from 'vitest';
import { helpText, parseArguments } from '../../src/cli/arguments.js';
import { commands, unbuiltCommands } from '../../src/cli/help.js';

function invocation(...words: string[]) {
  const request = parseArguments(words, '1.2.3');
  if (!('invocation' in request)) throw new Error(request.text);
  return request.invocation;
}

describe('parseArguments', () => {
  it('leaves values as they are written, and lists where several files are allowed', () => {
    const parsed = invocation(
      'fit',
      '--shipments',
      'a.csv',
      '-',
      '--table-withdrawn',
      'w.csv',
      '--levels',
      '0.8,x',
      '--quiet',
    );
    expect(parsed).toEqual({
      command: 'fit',
      settings: null,
      from: null,
      out: null,
      workers: null,
      singleFile: false,
      json: false,
      quiet: true,
      verbose: false,
      flags: { shipments: ['a.csv', '-'], tableWithdrawn: 'w.csv', levels: '0.8,x' },
    });
  });

  it('takes the last of a flag that stands twice, and joins lists', () => {
    const { flags } = invocation(
      'run',
      '--horizon',
      '3',
      '--horizon',
      '6',
      '--returns',
      'a',
      '--returns',
      'b',
    );
    expect(flags).toEqual({ horizon: '6', returns: ['a', 'b'] });
  });

  it('knows --single-file only where there is a report', () => {
    expect(invocation('report', '--single-file').singleFile).toBe(true);
    expect(() => invocation('fit', '--single-file')).toThrow(/unknown option '--single-file'/);
  });

  it.each(unbuiltCommands.map((name) => [name]))('refuses %s, which is not built', (name) => {
    expect(() => invocation(name, '--origins', '12', 'x')).toThrow(
      `unknown command ${name}: this version does not have it`,
    );
  });
});

describe('helpText', () => {
  it('fits 80 columns', () => {
    for (const name of [null, 'nonsense', ...Object.keys(commands)]) {
      const widest = Math.max(
        ...helpText(name)
          .split('\n')
          .map((line) => line.length),
      );
      expect(widest, String(name)).toBeLessThanOrEqual(80);
    }
  });
});
