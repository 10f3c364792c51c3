import { toTenths } from '#lib/acoustics/rounding';
import type { Evidence, EvidenceExceedance, StationEvidence } from '#lib/contracts/complaintEvidence';
import type { ChangedFigure } from '#lib/contracts/evidencePack';

type Reader = (station: StationEvidence) => string | null;

const decibels = (level: number | null | undefined): string | null =>
  level === null || level === undefined ? null : level.toFixed(1);

const FIGURES: readonly [figure: string, unit: string, read: Reader][] = [
  ['LAeq', 'dB', ({ LAeq }) => decibels(LAeq)],
  ['LAFmax', 'dB', ({ LAFmax }) => decibels(LAFmax)],
  ['LA10', 'dB', ({ LA10 }) => decibels(LA10)],
  ['LA90', 'dB', ({ LA90 }) => decibels(LA90)],
  ['Coverage', '%', ({ coverage }) => (coverage * 100).toFixed(2)],
  ['Usual LAeq, middle', 'dB', ({ usual }) => decibels(usual.median)],
  ['Usual LAeq, low', 'dB', ({ usual }) => decibels(usual.low)],
  ['Usual LAeq, high', 'dB', ({ usual }) => decibels(usual.high)],
  ['Weeks that count as usual', '', ({ usual }) => `${usual.validWeeks} of ${usual.weeks}`],
  ['Limits that apply', '', ({ limits }) => String(limits.applying)],
  ['Windows not judged yet', '', ({ limits }) => String(limits.unjudged)],
  [
    'Tones',
    '',
    ({ tones }) => tones.map(({ lowerHz, upperHz }) => `${lowerHz}–${upperHz} Hz`).join(', ') || 'none',
  ],
];

/** Figures that only newer evidence has; they are compared where both have them. */
const CONTEXT_FIGURES: readonly [figure: string, unit: string, read: Reader][] = [
  ['Percentile rank', '%', ({ context }) => context?.rank?.toString() ?? null],
  ['Uncertainty U', 'dB', ({ context }) => decibels(context?.uncertainty)],
  ['LCeq − LAeq', 'dB', ({ context }) => decibels(context?.lowFrequency?.difference)],
  ['Exclusions', '', ({ context }) => String(context?.exclusions.length ?? 0)],
];

/** Each figure that was sent and is another one now, of the stations that both have. */
export function changedFigures(sent: Evidence, now: Evidence): ChangedFigure[] {
  if (sent.digest === now.digest) return [];
  return sent.stations.flatMap((before) => {
    const after = now.stations.find(({ station }) => station === before.station);
    return after
      ? [
          ...figuresChanged(before, after),
          ...spectrumChanged(before, after),
          ...exceedancesChanged(before, after),
        ]
      : [];
  });
}

function figuresChanged(before: StationEvidence, after: StationEvidence): ChangedFigure[] {
  const compared = before.context && after.context ? [...FIGURES, ...CONTEXT_FIGURES] : FIGURES;
  return compared.flatMap(([figure, unit, read]) => {
    const [sent, now] = [read(before), read(after)];
    return sent === now ? [] : [{ ...named(before), figure, unit, sent, now }];
  });
}

/** How many bands of the spectrum differ, and by how much at most. */
function spectrumChanged(before: StationEvidence, after: StationEvidence): ChangedFigure[] {
  const differencesTenths = (before.context?.bands ?? []).flatMap(({ nominalHz, Leq }) => {
    const now = after.context?.bands.find((band) => band.nominalHz === nominalHz)?.Leq ?? null;
    return Leq === null || now === null ? [] : [Math.abs(toTenths(Leq) - toTenths(now))];
  });
  const changed = differencesTenths.filter((tenths) => tenths > 0);
  if (changed.length === 0) return [];
  const now = `${changed.length} bands differ, by up to ${(Math.max(...changed) / 10).toFixed(1)} dB`;
  return [{ ...named(before), figure: 'Spectrum', unit: '', sent: 'as sent', now }];
}

function exceedancesChanged(before: StationEvidence, after: StationEvidence): ChangedFigure[] {
  const ids = new Set([...before.exceedances, ...after.exceedances].map(({ id }) => id));
  return [...ids].flatMap((id) => {
    const [old, fresh] = [before, after].map(({ exceedances }) => exceedances.find((one) => one.id === id));
    const [sent, now] = [old, fresh].map((one) => (one ? exceedanceText(one) : null));
    const limit = (fresh ?? old)?.limit ?? '';
    if (sent === now) return [];
    return [
      {
        ...named(before),
        figure: `Exceedance of “${limit}”`,
        unit: '',
        sent: sent ?? null,
        now: now ?? null,
      },
    ];
  });
}

function exceedanceText({ level, threshold, unit = 'dB', state }: EvidenceExceedance): string {
  return `${level.toFixed(1)} against ${threshold.toFixed(1)} ${unit}${state === 'lifted' ? ', lifted' : ''}`;
}

function named({ station, name }: StationEvidence): Pick<ChangedFigure, 'station' | 'name'> {
  return { station, name };
}
