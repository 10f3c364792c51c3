import { listSettings, pickSettings } from '#db/queries/networks';
import { listPlantFindings } from '#db/queries/plantFindings';
import { listPlants, type PlantRow } from '#db/queries/plants';
import { type StationRow } from '#db/queries/stations';
import { bandByNominalHz } from '#lib/acoustics/bands';
import { byStrength, matchPlant, type PlantMatch } from '#lib/acoustics/plantMatches';
import { standingOut, type StandingOutRange } from '#lib/acoustics/standingOut';
import { formatInstantUtc } from '#lib/contracts/common';
import { type PlantCandidate, type PlantCandidates } from '#lib/contracts/plantCandidates';
import { isTone, standingOutWords } from '#lib/format/standingOut';
import { distanceM } from '../complaints/whereabouts';
import { periodFigures } from '../levels/figures';
import { type Span } from '../levels/spans';
import { statisticsOf } from '../levels/statistics';
import { candidateReason } from './candidateReason';
import { plantFindingJson } from './plantJson';
import { clocksOf, scheduledShare } from './schedule';

interface Examined {
  state: PlantCandidates['state'];
  coverage: number;
  meetsMinimum: boolean;
  ranges: StandingOutRange[];
}

/**
 * Which registered plants could make what stands out among its neighbours in the mean spectrum of a station's period, most
 * likely first. A broadband sound, above the usual in every band perhaps, stands out of nothing and names none. Octaves are
 * too wide to name a plant. What is noted about a plant now is taken to hold for the period, too.
 */
export async function plantCandidates(
  station: StationRow,
  period: Span,
  nowSec: number,
): Promise<PlantCandidates> {
  const timeline = await listSettings(station.networkId);
  const { timeZone } = pickSettings(timeline, period.fromSec);
  const [examined, plants, findings] = await Promise.all([
    examine(station, period, nowSec),
    listPlants(station.networkId),
    listPlantFindings(station.id, period),
  ]);
  const clocks = clocksOf(period, timeZone);
  const inUse = plants.filter(
    ({ retiredAt }) => retiredAt === null || retiredAt.getTime() / 1000 > period.fromSec,
  );
  return {
    from: formatInstantUtc(period.fromSec),
    to: formatInstantUtc(period.toSec),
    coverage: examined.coverage,
    meetsMinimum: examined.meetsMinimum,
    state: examined.state,
    standingOut: examined.ranges.map((range) => ({
      fromHz: range.fromHz,
      toHz: range.toHz,
      isTone: isTone(range),
      words: standingOutWords(range, 3),
    })),
    candidates: rank(
      inUse.flatMap((plant) => {
        const match = matchPlant(plant, examined.ranges);
        return match ? [{ plant, match, share: scheduledShare(plant, clocks), ...far(station, plant) }] : [];
      }),
      examined.ranges,
    ),
    findings: findings.map(plantFindingJson),
  };
}

async function examine(station: StationRow, period: Span, nowSec: number): Promise<Examined> {
  const figures = await periodFigures({ station, nowSec, ...period });
  const { coverage, meetsMinimum, tonality, seconds, bands } = statisticsOf(figures, { station });
  const shared = { state: tonality.state, coverage, meetsMinimum };
  if (tonality.state !== 'assessed') return { ...shared, ranges: [] };
  const measured = bands.flatMap(({ nominalHz, Leq }) => {
    const band = bandByNominalHz(3, nominalHz);
    return band ? [{ band, Leq }] : [];
  });
  const { ranges } = standingOut({
    fraction: 3,
    bands: measured.map(({ band }) => band),
    levelsDb: measured.map(({ Leq }) => Leq),
    averagedSec: seconds.valid,
  });
  return { ...shared, ranges };
}

interface Named {
  plant: PlantRow;
  match: PlantMatch;
  share: number;
  distanceM: number | null;
}

function far(station: StationRow, { latitude, longitude }: PlantRow): Pick<Named, 'distanceM'> {
  if (latitude === null || longitude === null) return { distanceM: null };
  return { distanceM: Math.round(distanceM(station, { latitude, longitude })) };
}

/** Scheduled to run at all, then how well it explains what stands out, then how long it was to run, then how near it is. */
function rank(named: Named[], ranges: readonly StandingOutRange[]): PlantCandidate[] {
  const ordered = named.sort(
    (a, b) =>
      Number(b.share > 0) - Number(a.share > 0) ||
      byStrength(a.match, b.match) ||
      b.share - a.share ||
      (a.distanceM ?? Infinity) - (b.distanceM ?? Infinity) ||
      a.plant.name.localeCompare(b.plant.name),
  );
  return ordered.map(({ plant, match, share, distanceM: metres }) => ({
    plant: plant.id,
    name: plant.name,
    kind: plant.kind,
    source: match.source,
    rangesExplained: match.rangeCount,
    scheduledShare: share,
    distanceM: metres,
    fit: match.fit,
    reason: candidateReason(plant, match, ranges, share),
  }));
}
