import type { StationRow } from '#db/queries/stations';
import { NO_LEVEL_CENTI_DB } from '#lib/acoustics/levelRange';
import { centiDbToDb } from '#lib/acoustics/rounding';
import type { WindowStrip } from '#lib/contracts/windowStrip';
import { spectrogram } from '../levels/spectrogram';

const MOST_STEPS = 180;
const SHORTEST_CONTEXT_SEC = 1800;

/** A window at a station with as much time before and after it (at least half an hour each), for a small drawing. */
export async function windowStrip(
  station: StationRow,
  window: { fromSec: number; toSec: number },
  nowSec: number,
): Promise<WindowStrip> {
  const aroundSec = Math.max(SHORTEST_CONTEXT_SEC, window.toSec - window.fromSec);
  const { header, laeqCentiDb, validSec, levelsCentiDb } = await spectrogram({
    station,
    fromSec: window.fromSec - aroundSec,
    toSec: Math.max(window.toSec, Math.min(window.toSec + aroundSec, nowSec)),
    mostColumns: MOST_STEPS,
  });
  const steps = Array.from({ length: header.columns }, (_, step) => step);
  return {
    fromSec: header.from,
    stepSec: header.stepSeconds,
    windowFromSec: window.fromSec,
    windowToSec: window.toSec,
    laeqDb: steps.map((step) => levelDb(laeqCentiDb[step])),
    isValid: steps.map((step) => (validSec[step] ?? 0) > 0),
    bandsHz: header.bands,
    bandLevelsDb: steps.map((step) =>
      header.bands.map((_, band) => levelDb(levelsCentiDb[step * header.bands.length + band])),
    ),
  };
}

function levelDb(centiDb: number | undefined): number | null {
  return centiDb === undefined || centiDb === NO_LEVEL_CENTI_DB ? null : centiDbToDb(centiDb);
}
