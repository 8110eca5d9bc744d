// A thread that answers the first jobs last, so that results arrive out of order.
import { parentPort } from 'node:worker_threads';

parentPort.on('message', ({ index, input }) => {
  setTimeout(() => parentPort.postMessage({ index, value: input * 10 }), index === 0 ? 120 : 5);
});
