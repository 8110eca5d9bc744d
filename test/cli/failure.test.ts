import { describe, expect, it } from 'vitest';
import { describeFailure } from '../../src/cli/failure.js';
import { UserError } from '../../src/errors.js';

describe('describeFailure', () => {
  it('writes one line a fault and an object with every member', () => {
    const first = {
      code: 'bad-date',
      message: 'invalid date "soon"',
      file: 'r.csv',
      line: 7,
      remedy: 'mend it',
    };
    const failure = describeFailure(
      new UserError([first, { code: 'other', message: 'missing horizon' }], 3),
      false,
    );
    expect(failure.text).toBe(
      'returnfall: r.csv:7: invalid date "soon"; mend it\nreturnfall: missing horizon\n',
    );
    expect(failure.exitCode).toBe(3);
    const absent = { file: null, line: null, column: null, remedy: null };
    expect(failure.document.error).toEqual({
      ...first,
      column: null,
      more: [{ code: 'other', message: 'missing horizon', ...absent }],
    });
  });

  it('calls anything else a fault of the program, with the stack only on request', () => {
    const error = new TypeError('x is undefined');
    expect(describeFailure(error, false)).toMatchObject({
      exitCode: 1,
      text: 'returnfall: this is a fault of the program, not of the input (TypeError: x is undefined); run it again with --verbose and report what it prints\n',
    });
    expect(describeFailure(error, true).text).toContain(error.stack ?? 'no stack');
    expect(describeFailure('a thrown text', false).exitCode).toBe(1);
  });

  it('keeps a name from a file on one line and away from the terminal', () => {
    const failure = describeFailure(
      new UserError({ code: 'x', message: 'unknown product "\u001b[31m\nA"' }, 3),
      false,
    );
    expect(failure.text).toBe('returnfall: unknown product "\\u{1b}[31m\\nA"\n');
  });
});
