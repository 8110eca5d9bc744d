#!/usr/bin/env node
import { readFileSync } from 'node:fs';
import { exitCodes, UserError } from '../errors.js';
import { helpText, type Invocation, parseArguments } from './arguments.js';
import { describeFailure, nothingToDo } from './failure.js';
import { openScope } from './scope.js';
import { processTerminal } from './terminal.js';

process.stdout.on('error', endOfReader);
process.exitCode = await main(process.argv.slice(2));

/** Runs one command line. @returns the exit code. */
async function main(words: readonly string[]): Promise<number> {
  const version = readVersion();
  if (words.length === 0) {
    process.stderr.write(helpText(null));
    return exitCodes.unusableSettings;
  }
  try {
    const request = parseArguments(words, version);
    if ('invocation' in request) return await runToEnd(request.invocation, version);
    process.stdout.write(request.text);
    return exitCodes.done;
  } catch (error) {
    return fail(error, words);
  }
}

/** Runs a command; whatever happens, nothing half-made is left behind. */
async function runToEnd(invocation: Invocation, version: string): Promise<number> {
  const terminal = processTerminal(invocation.quiet);
  const scope = openScope();
  scope.add(terminal.progress.stop);
  const controller = new AbortController();
  const onSignal = (signal: 'SIGINT' | 'SIGTERM', exitCode: number) =>
    process.once(signal, () => {
      controller.abort(new Error(`stopped by ${signal}`));
      scope.close();
      process.stderr.write(`returnfall: stopped by ${signal}; earlier output is as it was\n`);
      process.exit(exitCode);
    });
  onSignal('SIGINT', 130);
  onSignal('SIGTERM', 143);
  try {
    // Loaded only now: help and faults of the command line should not wait for what they do not need.
    const { runCommand } = await import('./command.js');
    return await runCommand(invocation, { version, scope, terminal, signal: controller.signal });
  } finally {
    scope.close();
  }
}

function fail(error: unknown, words: readonly string[]): number {
  const failure = describeFailure(error, words.includes('--verbose'));
  if (error instanceof UserError && error.faults[0]?.code === nothingToDo) {
    process.stderr.write(`${helpText(words[0] ?? null)}\n`);
  }
  process.stderr.write(failure.text);
  if (words.includes('--json')) process.stdout.write(`${JSON.stringify(failure.document, null, 2)}\n`);
  return failure.exitCode;
}

function readVersion(): string {
  const text = readFileSync(new URL('../../package.json', import.meta.url), 'utf8');
  return (JSON.parse(text) as { version: string }).version;
}

/** A reader such as `head` that closes the pipe has seen enough, which is no fault; a full disk is. */
function endOfReader(error: NodeJS.ErrnoException): void {
  if (error.code === 'EPIPE') process.exit();
  process.stderr.write(`returnfall: standard output cannot be written (${error.message})\n`);
  process.exit(exitCodes.unusableSettings);
}
