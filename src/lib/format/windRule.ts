import type { WindRule } from '#lib/acoustics/windRule';
import { formatSpeed } from './wind';

/**
 * The wind that a limit goes by in words: "only wind of 1.0 m/s to 5.0 m/s from 180° to 270° counts; not compared when the mean wind is
 * above 5.0 m/s; unknown wind does not count".
 */
export function windRuleText(rule: WindRule): string {
  const wanted = [speedText(rule), sectorText(rule)].filter((text) => text !== null);
  const { dismissAboveMs } = rule;
  return [
    wanted.length > 0 && `only wind ${wanted.join(' ')} counts`,
    dismissAboveMs !== null && `not compared when the mean wind is above ${formatSpeed(dismissAboveMs)}`,
    unknownText(rule, wanted.length > 0),
  ]
    .filter(Boolean)
    .join('; ');
}

function speedText({ minimumMs, maximumMs }: WindRule): string | null {
  if (minimumMs === null && maximumMs === null) return null;
  if (maximumMs === null) return `of at least ${formatSpeed(minimumMs ?? 0)}`;
  if (minimumMs === null) return `of at most ${formatSpeed(maximumMs)}`;
  return `of ${formatSpeed(minimumMs)} to ${formatSpeed(maximumMs)}`;
}

function sectorText({ fromDeg, toDeg }: WindRule): string | null {
  return fromDeg === null || toDeg === null ? null : `from ${fromDeg}° clockwise to ${toDeg}°`;
}

function unknownText({ unknown, dismissAboveMs }: WindRule, hasWanted: boolean): string {
  if (unknown === 'counts') return 'unknown wind counts as fitting';
  return [
    hasWanted && 'intervals with unknown wind do not count',
    dismissAboveMs !== null && 'windows with less than half of it known are not compared',
  ]
    .filter(Boolean)
    .join('; ');
}
