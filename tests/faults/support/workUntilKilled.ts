import { thisWorker } from '#ingest/sharing/thisWorker';

/** A worker that holds a lease until it is killed. */
await thisWorker.join();
console.log((await thisWorker.leases.take('killed')) ? 'holds' : 'does not hold');
setInterval(() => undefined, 1000);
