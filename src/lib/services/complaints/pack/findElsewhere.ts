import type { ComplaintRow } from '#db/queries/complaints';
import { findStationById } from '#db/queries/stations';
import { formatInstantUtc } from '#lib/contracts/common';
import type { Elsewhere, PackItem } from '#lib/contracts/evidencePack';
import { sameSpectrum } from '../sameSpectrum';

/**
 * When the spectrum of a complaint's time was heard on other dates, where that item was chosen; null where it was not, or there is no
 * station. It is kept with the answer as it was found: another search, another day, may find more.
 */
export async function findElsewhere(
  complaint: ComplaintRow,
  items: readonly PackItem[],
  nowSec: number,
): Promise<Elsewhere | null> {
  if (!items.includes('elsewhere') || complaint.nearestStationId === null) return null;
  const station = await findStationById(complaint.nearestStationId);
  if (!station) return null;
  const period = { fromSec: complaint.startsAtSec, toSec: complaint.endsAtSec };
  const { state, why, searched, spells, found, pattern } = await sameSpectrum({ station, period, nowSec });
  return {
    since: formatInstantUtc(searched.fromSec),
    until: formatInstantUtc(searched.toSec),
    spells: spells.map(({ stationName, from, to, best }) => ({
      station: stationName,
      from,
      to,
      likenessDb: best,
    })),
    count: found,
    isComplete: state === 'searched',
    isSearched: state !== 'not-searched',
    note: [why, pattern].filter(Boolean).join(' ') || null,
  };
}
