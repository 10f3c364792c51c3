import { coverageUncertaintyDb, periodUncertainty } from '#lib/acoustics/uncertainty';
import { type FigureRow } from '#lib/contracts/figureSheet';
import { type PeriodDrift } from '../calibrations/periodDrift';
import { type PeriodFigures } from '../levels/figures';
import { type MeasuredHour } from './heatMap';
import { type PeriodInstruments } from './instruments';
import { figureRow } from './figureRow';

/** What the checks about a period tell of drift, in words. */
const DRIFT_BASIS: Record<PeriodDrift['known'], string> = {
  both: 'the largest that the checks before, in and after the period show',
  before: 'by the check before the period; none has followed it yet',
  after: 'by the checks in or after the period; none is before it',
  none: 'no check of the instrument is on record about this period, so none is in it',
};

/** Expanded uncertainty of the period's LAeq: class of the instrument, drift by its checks, gaps by hourly energies. */
export function uncertaintyRow(
  figures: PeriodFigures,
  hours: readonly MeasuredHour[],
  instruments: PeriodInstruments,
): FigureRow {
  const energies = hours
    .filter(({ levels }) => levels.sums.validSec > 0)
    .map(({ levels }) => levels.sums.aEnergySec / levels.sums.validSec);
  const coverageDb =
    figures.levels.sums.validSec === 0 ? null : coverageUncertaintyDb(energies, figures.coverage);
  const { driftDb, known } = instruments.drift;
  const uncertainty = periodUncertainty({ instrumentDb: instruments.uncertaintyDb, driftDb, coverageDb });
  const gaps = coverageDb === null ? '' : coverageDb.toFixed(2);
  return figureRow(
    {
      key: 'U',
      name: 'Expanded uncertainty U of LAeq',
      value: uncertainty?.expandedDb ?? null,
      convention:
        'U = 2u, coverage factor 2, about 95 % (ISO 1996-2). The term for gaps is Bittern’s own, 4.34·s/(Ē·√n)·√(1 − c) over the ' +
        'hourly energies, and assumes that gaps fall at random.',
      note: uncertainty
        ? `u = ${uncertainty.uDb.toFixed(2)} dB, of instrument ${instruments.uncertaintyDb} dB (${instruments.basis}), calibration drift ${driftDb.toFixed(2)} dB (${DRIFT_BASIS[known]}) and gaps ${gaps} dB. ` +
          'Site, weather and source are not in it.'
        : null,
      ifMissing:
        figures.levels.sums.validSec === 0
          ? 'No valid data in this period.'
          : 'With gaps it takes at least two hours with data to tell their part.',
    },
    figures,
  );
}
