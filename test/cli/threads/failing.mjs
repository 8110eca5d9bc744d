// A thread that fails in the way that its input names.
import { parentPort } from 'node:worker_threads';

parentPort.on('message', ({ index, input }) => {
  if (input === 'exit') process.exit(7);
  if (input === 'throw') throw new RangeError('the thread broke');
  if (input === 'fault') {
    const faults = [{ code: 'unusable', message: 'invalid record', file: 'a.csv', line: 3 }];
    parentPort.postMessage({ index, faults, exitCode: 3 });
  }
  // 'hang' never answers
});
