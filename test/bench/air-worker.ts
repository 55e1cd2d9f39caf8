import { parentPort, workerData } from 'node:worker_threads';
import { sampledDay, type SampledShare } from './sampled-day.js';

const share = workerData as SampledShare;
// Some draws once before, so that neither contender is timed while its code is being compiled.
sampledDay({ ...share, count: Math.min(16, share.count) });
parentPort?.on('message', () => {
  parentPort?.postMessage(sampledDay(share));
});
parentPort?.postMessage('ready');
