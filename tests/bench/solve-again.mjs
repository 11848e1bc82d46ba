// A thread that has a network file solved again and again until it is told to stop: the megabytes that come back do not hold up who measures.
import { parentPort, workerData } from 'node:worker_threads';

const { url, headers, file } = workerData;
let stopped = false;
let solves = 0;
let refusal;
parentPort.on('message', () => {
  stopped = true;
});
while (!stopped && refusal === undefined) {
  const answer = await fetch(url, { method: 'POST', headers, body: file });
  const bytes = await answer.arrayBuffer();
  if (answer.status === 200) solves += 1;
  else refusal = `${answer.status}: ${Buffer.from(bytes).toString().slice(0, 300)}`;
}
parentPort.postMessage({ solves, refusal });
parentPort.close();
