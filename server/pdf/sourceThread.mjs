/** Starts a TypeScript program in a thread: the loader of the main program does not reach into one. */
import { workerData } from 'node:worker_threads';
import { register } from 'tsx/esm/api';

register();
await import(workerData.program);
