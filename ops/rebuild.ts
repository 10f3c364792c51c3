import { closeDb } from '#db/client';
import { dropComputed } from '#ingest/aggregate/rebuild';

const USAGE = `Drops what is computed from intervals, so that the worker computes it again: npx tsx ops/rebuild.ts --all
What monitors sent and people decided, and what retention has sealed, stays. Web and worker may run.`;

/** Settings are those of web and worker. */
if (process.argv.length !== 3 || process.argv[2] !== '--all') {
  console.error(USAGE);
  process.exitCode = 2;
} else {
  const stations = await dropComputed();
  console.log(`Of ${stations} stations all that is computed waits for the worker.`);
  await closeDb();
}
