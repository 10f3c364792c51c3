import { workerData } from 'node:worker_threads';
import { register } from 'tsx/esm/api';

// A thread does not take over how its process reads TypeScript.
register();
await import(workerData.module);
