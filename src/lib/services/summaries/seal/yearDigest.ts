import { createHash } from 'node:crypto';
import { type NetworkSettings } from '#db/queries/networks';
import { formatInstantUtc } from '#lib/contracts/common';
import { type YearDigest } from '#lib/contracts/summaryManifest';
import { groupBy } from '../../groupBy';
import { type CurrentPeriod } from '../document/currentPeriods';
import { type HourEnergy } from '../document/uncertainties';
import { type EarlierGround } from '../document/yearToDate';
import { dateSettings } from '../../levels/datePeriods';
import { type Span } from '../../levels/spans';

/** Of an energy: far more than any figure shows, and fewer than the order of adding up can change. */
const DIGITS = 10;

/** Collects digests of what each station’s year so far rests on before a month, month by month. */
export class YearDigests {
  readonly #span: Span;
  readonly #months: { month: string; fromSec: number }[];
  readonly #stations: YearDigest['stations'] = [];

  /** `timeline`: the network’s settings in order of their beginning. */
  constructor(month: string, timeline: NetworkSettings[]) {
    const startOf = (of: string) => dateSettings(`${of}-01`, timeline).midnightSec;
    const ofYear = Array.from(
      { length: 12 },
      (_, at) => `${month.slice(0, 4)}-${String(at + 1).padStart(2, '0')}`,
    );
    this.#months = ofYear.filter((of) => of < month).map((of) => ({ month: of, fromSec: startOf(of) }));
    this.#span = { fromSec: startOf(ofYear[0] ?? month), toSec: startOf(month) };
  }

  /** Adds a station: of each hour with valid time, and then of each day, evening and night with some, a line and a line feed. */
  add(code: string, { hours, periods }: EarlierGround): void {
    const measured = periods.filter(({ sums }) => sums.validSec > 0);
    const hoursOf = groupBy(hours, ({ fromSec }) => this.#monthAt(fromSec));
    const periodsOf = groupBy(measured, ({ date }) => date.slice(0, 7));
    const months = this.#months.flatMap(({ month }) => {
      const [ownHours, ownPeriods] = [hoursOf.get(month) ?? [], periodsOf.get(month) ?? []];
      if (ownHours.length + ownPeriods.length === 0) return [];
      const hash = createHash('sha256');
      for (const hour of ownHours) hash.update(`${hourLine(hour)}\n`);
      for (const period of ownPeriods) hash.update(`${periodLine(period)}\n`);
      return [{ month, hours: ownHours.length, periods: ownPeriods.length, sha256: hash.digest('hex') }];
    });
    this.#stations.push({ code, months });
  }

  /** Digests of all stations with one of them all. */
  digest(): YearDigest {
    const stations = [...this.#stations].sort((a, b) => (a.code < b.code ? -1 : 1));
    const hash = createHash('sha256');
    for (const { code, months } of stations) {
      for (const { month, hours, periods, sha256 } of months) {
        hash.update(`${code} ${month} ${hours} ${periods} ${sha256}\n`);
      }
    }
    const { fromSec, toSec } = this.#span;
    return {
      from: formatInstantUtc(fromSec),
      to: formatInstantUtc(toSec),
      sha256: hash.digest('hex'),
      stations,
    };
  }

  #monthAt(sec: number): string | undefined {
    return this.#months.findLast(({ fromSec }) => fromSec <= sec)?.month;
  }
}

/** `hour 1767225600 3600 5.012345678e+8`: beginning, valid seconds, sum of their energies. */
function hourLine({ fromSec, levels: { sums } }: HourEnergy): string {
  return `hour ${fromSec} ${sums.validSec} ${sums.aEnergySec.toExponential(DIGITS - 1)}`;
}

/** The same of a period from when to when, with highest LAFmax, length of samples (mixed: 0) and the packed distribution of LAeq. */
function periodLine({ kind, fromSec, toSec, sums }: CurrentPeriod): string {
  const energy = sums.aEnergySec.toExponential(DIGITS - 1);
  const classes = Buffer.from(sums.aClasses.encode()).toString('hex');
  return `${kind} ${fromSec} ${toSec} ${sums.validSec} ${energy} ${sums.lafmaxCentiDb ?? '-'} ${sums.sampleSec ?? 0} ${classes}`;
}
