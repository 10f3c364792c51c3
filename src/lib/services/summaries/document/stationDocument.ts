import { type CalibrationRow } from '#db/queries/calibrations';
import { type ExceedanceRow } from '#db/queries/exceedances';
import { bandSlot } from '#lib/acoustics/bands';
import { thirdsOfOctave } from '#lib/acoustics/octaves';
import { type PeriodAccumulator } from '#lib/acoustics/periodStatistics';
import { formatInstantUtc } from '#lib/contracts/common';
import { type DocumentStation } from '#lib/contracts/monthDocument';
import { type DocumentBand } from '#lib/contracts/monthEvidence';
import { madeBy } from '../../calibrations/madeBy';
import { calibrationJson } from '../../calibrations/calibrationJson';
import { instrumentsOf } from '../../figures/instruments';
import { stationBands, stationOctaves, type PlacedBand } from '../../figures/stationBands';
import { dayFigures } from '../../levels/days';
import { incidentOf, placementsIn } from '../../levels/incident';
import { monthFigures } from '../../levels/month';
import { mastsOf } from '../../weather/mastsOf';
import { complianceOf, type LimitInForce } from './compliance';
import { readEvidence, type MonthEvidence, type StationMonth } from './evidence';
import { documentExceedance } from './exceedances';
import { exclusionEffect } from './exclusionEffect';
import { documentHours, monthHours } from './hours';
import { packedSpectrogram } from './spectrogram';
import { documentDay, documentFigures } from './stationFigures';
import { documentLowFrequency, documentTonality } from './tonality';
import { monthWind } from './wind';
import { yearToDate, type EarlierGround } from './yearToDate';

/** What a network’s month knows beside one station’s own data. */
export interface SharedEvidence {
  limits: readonly LimitInForce[];
  /** Of the whole network in the month. */
  exceedances: readonly ExceedanceRow[];
  /** Standing checks of the whole network. */
  calibrations: readonly CalibrationRow[];
  /** Told of each station what its year so far rests on before the month. */
  onEarlier: (station: string, ground: EarlierGround) => void;
}

/** Everything that a month’s document says of one station. */
export async function stationDocument(month: StationMonth, shared: SharedEvidence): Promise<DocumentStation> {
  const { station, span, timeline, nowSec, conn } = month;
  const evidence = await readEvidence(month);
  const { series } = evidence;
  const found = await monthFigures({ station, month: span.month, timeline, nowSec, series }, conn);
  const days = await dayFigures(
    { station, fromDate: span.firstDate, toDate: span.endDate, timeline, nowSec, series },
    conn,
  );
  const hours = await monthHours(evidence);
  const civil = { fromSec: span.fromSec, toSec: span.toSec };
  const instruments = await instrumentsOf({ station, period: civil, timeZone: span.timeZone, conn });
  const incident = await incidentOf({ station, ...civil, timeline, nowSec }, found.statistics.LAeq, conn);
  const ground = { hours, instruments, incidentDb: incident.LAeq };
  const figures = documentFigures(evidence, found, ground);
  const own = shared.exceedances.filter(({ stationId }) => stationId === station.id);
  const year = await yearToDate(evidence, hours);
  shared.onEarlier(station.code, year.earlier);
  const standing = own.filter(({ state }) => state === 'standing').length;
  return {
    ...(await describe(evidence)),
    figures,
    yearToDate: year.figures,
    days: days
      .filter((day) => day.periods.day.seconds.expected > 0 || day.seconds.expected > 0)
      .map((day) => documentDay(evidence, day, ground)),
    hours: documentHours(evidence, hours),
    ...bandsOf(evidence, found.levels, figures.seconds.expected),
    spectrogram: packedSpectrogram(evidence, found.levels),
    tonality: documentTonality(evidence, found.levels),
    lowFrequency: documentLowFrequency(evidence, found.levels),
    exclusions: await exclusionEffect(evidence, figures, found.isSchemeMixed),
    exceedances: { standing, lifted: own.length - standing, items: own.map(documentExceedance) },
    compliance: complianceOf(station, shared.limits, own, figures.meetsMinimum),
    calibrations: await calibrationsOf(evidence, shared),
    wind: await monthWind(month),
  };
}

type Description = Pick<
  DocumentStation,
  | 'code'
  | 'name'
  | 'latitude'
  | 'longitude'
  | 'placement'
  | 'mastHeightMetres'
  | 'bandFraction'
  | 'intervalSeconds'
  | 'placements'
  | 'instruments'
  | 'masts'
  | 'standsFrom'
  | 'standsTo'
  | 'coverageSinceRegistration'
>;

async function describe({ station, span, series, nowSec, conn }: MonthEvidence): Promise<Description> {
  const measured = { fromSec: span.fromSec, toSec: span.lastNightEndSec };
  const registeredSec = Math.floor(station.createdAt.getTime() / 1000);
  const since = { fromSec: Math.max(span.fromSec, registeredSec), toSec: Math.min(span.toSec, nowSec) };
  const { sums } = await series.levels({ ...since, toSec: Math.max(since.fromSec, since.toSec) });
  return {
    code: station.code,
    name: station.name,
    latitude: station.latitude,
    longitude: station.longitude,
    placement: station.placement,
    mastHeightMetres: station.mastHeightM,
    bandFraction: station.bandFraction,
    intervalSeconds: station.intervalSec,
    placements: await placementsIn(station, measured, conn),
    instruments: await madeBy(station, measured, conn),
    masts: await mastsOf(station.id, measured),
    standsFrom: station.createdAt.toISOString(),
    standsTo: station.retiredAt?.toISOString() ?? null,
    coverageSinceRegistration:
      since.fromSec >= since.toSec ? null : Math.min(1, sums.validSec / (since.toSec - since.fromSec)),
  };
}

function bandsOf(
  { station }: MonthEvidence,
  levels: PeriodAccumulator,
  expectedSec: number,
): Pick<DocumentStation, 'bands' | 'octaves'> {
  const coverageOf = (validSec: number) => (expectedSec === 0 ? 0 : Math.min(1, validSec / expectedSec));
  const validSecOf = (index: number) => levels.sums.bandValidSec[bandSlot(index)] ?? 0;
  const isOctaves = levels.sums.bandFraction === 1;
  const bands = stationBands(station, levels).map(({ index, nominalHz }: PlacedBand): DocumentBand => ({
    nominalHz,
    Leq: levels.bandLeqDb(index),
    L10: levels.bandExceedanceLevelDb(index, 10),
    L50: levels.bandExceedanceLevelDb(index, 50),
    L90: levels.bandExceedanceLevelDb(index, 90),
    coverage: coverageOf(validSecOf(index)),
  }));
  const octaves = stationOctaves(station, levels).map(({ index, nominalHz }: PlacedBand): DocumentBand => ({
    nominalHz,
    Leq: levels.octaveLeqDb(index),
    L10: levels.octaveExceedanceLevelDb(index, 10),
    L50: levels.octaveExceedanceLevelDb(index, 50),
    L90: levels.octaveExceedanceLevelDb(index, 90),
    coverage: coverageOf(isOctaves ? validSecOf(index) : Math.min(...thirdsOfOctave(index).map(validSecOf))),
  }));
  return { bands, octaves };
}

async function calibrationsOf(
  { station, span, conn }: MonthEvidence,
  { calibrations }: SharedEvidence,
): Promise<DocumentStation['calibrations']> {
  const serials = new Set(
    (await madeBy(station, { fromSec: span.fromSec, toSec: span.toSec }, conn)).map(
      ({ serialNumber }) => serialNumber,
    ),
  );
  return calibrations
    .filter(
      ({ serialNumber, checkedAtSec }) =>
        serials.has(serialNumber) && span.fromSec <= checkedAtSec && checkedAtSec < span.toSec,
    )
    .sort((a, b) => a.checkedAtSec - b.checkedAtSec)
    .map((row) => {
      const { calibrator, calibratorLevel, before, after, drift, driftBound, isWithinBound } =
        calibrationJson(row);
      return {
        serialNumber: row.serialNumber,
        checkedAt: formatInstantUtc(row.checkedAtSec),
        calibrator,
        calibratorLevel,
        before,
        after,
        drift,
        driftBound,
        isWithinBound,
      };
    });
}
