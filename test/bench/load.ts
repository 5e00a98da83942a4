import { Worker } from 'node:worker_threads';

// Plain JavaScript in a thread of its own, so that asking does not take the answering thread's time.
const CLIENT = `
const { parentPort, workerData } = require('node:worker_threads');
const http = require('node:http');
const { url, headers, count, connections } = workerData;
const agent = new http.Agent({ keepAlive: true, maxSockets: connections });
let sent = 0, done = 0;
const begin = performance.now();
function next() {
  if (sent >= count) return;
  sent += 1;
  http.get(url, { agent, headers }, (answer) => {
    if (answer.statusCode >= 400) throw new Error('status ' + answer.statusCode);
    answer.resume();
    answer.on('end', () => {
      done += 1;
      if (done === count) { parentPort.postMessage((count * 1000) / (performance.now() - begin)); agent.destroy(); }
      else next();
    });
  });
}
for (let i = 0; i < connections; i += 1) next();
`;

/** Asks an address on this machine a fixed number of times over 20 connections, and tells the rate. Ends by itself. */
export function requestsPerSecond(url: string, headers: Record<string, string>): Promise<number> {
  return new Promise((resolve, reject) => {
    const worker = new Worker(CLIENT, {
      eval: true,
      workerData: { url, headers, count: 4000, connections: 20 },
    });
    worker.once('message', resolve);
    worker.once('error', reject);
  });
}
