import type { NewLimitVersion } from '#db/queries/limits';
import type { StationRow } from '#db/queries/stations';
import { bandByNominalHz, bandLabel, type Band } from '#lib/acoustics/bands';
import { thirdsOfOctave } from '#lib/acoustics/octaves';
import { MOST_DAYS_BACK, WEEKDAYS, type NewLimit } from '#lib/contracts/limits';

/** What is wrong with a limit, by field. */
export interface FieldProblem {
  field: keyof NewLimit;
  message: string;
}

/** A version of a limit without who made it. */
export type LimitRule = Required<Omit<NewLimitVersion, 'createdBy'>>;

export type ReadRule = { isValid: true; version: LimitRule } | { isValid: false; problems: FieldProblem[] };

/** A limit as it is stored, from what the interface was given; `stations` are those of the network. */
export function readRule(limit: NewLimit, stations: readonly StationRow[], nowSec: number): ReadRule {
  const problems: FieldProblem[] = [];
  const effectiveFromSec = limit.effectiveFrom ?? nowSec;
  if (effectiveFromSec < nowSec - MOST_DAYS_BACK * 86_400)
    problems.push({ field: 'effectiveFrom', message: `must be at most ${MOST_DAYS_BACK} days ago` });
  const [band, bandTo] = bandsOfLimit(limit);
  const named = limit.stations === null ? null : [...new Set(limit.stations)].sort();
  const chosen = named?.map((code) => stations.find((station) => station.code === code));
  const unknown = named?.filter((_, at) => !chosen?.[at]) ?? [];
  if (unknown.length > 0)
    problems.push({ field: 'stations', message: `${unknown.join(', ')}: no station of this network` });
  const known = chosen?.filter((station) => station !== undefined) ?? null;
  const without = band
    ? (known ?? []).filter((station) => !measures(station, band) || !measures(station, bandTo ?? band))
    : [];
  if (band && without.length > 0) {
    const codes = without.map(({ code }) => code).join(', ');
    const upTo = bandTo ? ` to ${bandLabel(bandTo)}` : '';
    const what = `${bandLabel(band)}${upTo} ${band.fraction === 3 ? 'third' : 'octave'}${bandTo ? 's' : ''}`;
    problems.push({ field: 'stations', message: `${codes}: not measured there, the ${what}` });
  }
  if (problems.length > 0) return { isValid: false, problems };
  return {
    isValid: true,
    version: {
      effectiveFromSec,
      name: limit.name,
      metric: limit.metric,
      averaging: limit.window,
      windowMin: limit.windowMinutes,
      stepMin: limit.stepMinutes,
      bandFraction: limit.bandFraction,
      bandIndex: band?.index ?? null,
      bandToIndex: bandTo?.index ?? null,
      percent: limit.percent,
      eventTenths: limit.eventThreshold === null ? null : Math.round(limit.eventThreshold * 10),
      eventMinimumSec: limit.eventSeconds,
      thresholdTenths: Math.round(limit.threshold * 10),
      weekdays: limit.weekdays.reduce((bits, day) => bits | (1 << WEEKDAYS.indexOf(day)), 0),
      holidays: limit.holidays,
      fromMin: limit.from,
      toMin: limit.to,
      minimumCoverage: limit.minimumCoverage,
      stationIds: known && known.map(({ id }) => id),
      recipients: distinctAddresses(limit.recipients),
      reason: limit.reason,
    },
  };
}

/** The band of a limit, and of several the last one. */
function bandsOfLimit({ bandFraction, bandHz, bandToHz }: NewLimit): (Band | undefined)[] {
  return [bandHz, bandToHz].map((hz) => (bandFraction && hz ? bandByNominalHz(bandFraction, hz) : undefined));
}

/** Whether a station has a band: its own, or an octave whose three thirds it has. */
export function measures(
  { bandFraction, firstBandIndex, lastBandIndex }: StationRow,
  { fraction, index }: Pick<Band, 'fraction' | 'index'>,
): boolean {
  if (bandFraction === 1 && fraction === 3) return false;
  const needed = bandFraction === fraction ? [index] : thirdsOfOctave(index);
  return needed.every((one) => firstBandIndex <= one && one <= lastBandIndex);
}

/** An address that differs only in capitals is the same one. */
function distinctAddresses(addresses: readonly string[]): string[] {
  return [...new Map(addresses.map((address) => [address.toLowerCase(), address])).values()];
}
