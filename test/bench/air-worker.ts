import { parentPort, workerData } from 'node:worker_threads';
import { drawnDay, type SampledDay } from './sampled-day.js';

const share = workerData as SampledDay;
// Some draws once before, so that neither contender is timed while its code is being compiled.
drawnDay({ ...share, draws: share.draws.slice(0, 32) });
parentPort?.on('message', () => {
  const drawn = drawnDay(share);
  // Mouths at one place share a list: each is handed over once, and none is copied.
  const lists = [...drawn.values, ...drawn.worst, ...drawn.firstS];
  parentPort?.postMessage(drawn, [...new Set(lists.map(({ buffer }) => buffer as ArrayBuffer))]);
});
parentPort?.postMessage('ready');
