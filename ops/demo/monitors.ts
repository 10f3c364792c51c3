import { join } from 'node:path';
import { bandRange } from '#lib/acoustics/bands';
import { config } from '#lib/config/index';
import { log } from '#lib/config/log';
import { runMonitor } from '#ingest/monitor/monitor';
import { makeRecorder } from '#ingest/monitor/soundscape/record';
import { SOUNDSCAPES } from '#ingest/monitor/soundscape/places';
import { STATION_SITES } from '#ops/standins/tiles/sites';
import { runMast } from './mast';
import { readTokens, setupOf } from './stations';

/** A monitor that was off fills in at most this much. */
const MEMORY_SEC = 3 * 86_400;

/** The demo's eight field monitors: they measure the invented soundscape and post it through the interface, as real ones would. */
const stop = new AbortController();
for (const signal of ['SIGTERM', 'SIGINT'] as const) process.on(signal, () => stop.abort());

const { host, port, dataDir } = config();
const tokens = readTokens(dataDir);
const mast = runMast(`http://${host}:${port}`, dataDir, stop.signal);
await Promise.all([
  mast,
  ...STATION_SITES.map((site) => {
    const soundscape = SOUNDSCAPES.find(({ code }) => code === site.code);
    const token = tokens[site.code];
    if (!soundscape || !token) throw new Error(`${site.code} has no soundscape or token.`);
    const setup = setupOf(site);
    return runMonitor(
      {
        serverUrl: `http://${host}:${port}`,
        token,
        bandsHz: bandRange(setup.bandFraction, setup.firstBandHz, setup.lastBandHz).map(
          ({ nominalHz }) => nominalHz,
        ),
        batchSize: 1000,
        intervalSec: setup.intervalSec,
        spoolDirectory: join(dataDir, 'demo', 'spool', site.code),
        postEverySec: 5,
        memorySec: MEMORY_SEC,
        measure: makeRecorder(soundscape, setup),
        onOutcome: (outcome) => {
          if (outcome.kind === 'later' || outcome.kind === 'refused')
            log().warn({ station: site.code, ...outcome }, 'post waits');
        },
      },
      stop.signal,
    ).catch((error: unknown) => {
      if (!stop.signal.aborted) throw error;
    });
  }),
]);
