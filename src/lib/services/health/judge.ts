import { type TroubleKind } from '#lib/contracts/health';
import { clockRule, coverageRule, lateRule, silentRule } from './arrivalRules';
import { bandsRule, batteryRule, floorRule, frozenRule, windRule } from './contentRules';
import { flagsRule } from './flagsRule';
import { UNKNOWN, type Finding, type Rule, type StationEvidence } from './evidence';

/** Troubles that the newest data tell of; the others are judged night by night. */
export type PresentKind = Exclude<TroubleKind, 'drift' | 'selfcheck'>;

const RULES: Record<PresentKind, Rule> = {
  silent: silentRule,
  clock: clockRule,
  frozen: frozenRule,
  bands: bandsRule,
  floor: floorRule,
  flags: flagsRule,
  battery: batteryRule,
  late: lateRule,
  coverage: coverageRule,
  wind: windRule,
};

/**
 * What every rule finds at a station. Of a silent one nothing else can be said: its other troubles stay as they were, and none
 * is added. `openSince` holds when those began that are not over.
 */
export function judgeStation(
  evidence: StationEvidence,
  openSince: ReadonlyMap<string, number>,
): Map<PresentKind, Finding> {
  const find = (kind: PresentKind) => RULES[kind](evidence, openSince.get(kind) ?? null);
  const isSilent = find('silent').state === 'bad';
  const kinds = Object.keys(RULES) as PresentKind[];
  return new Map(kinds.map((kind) => [kind, isSilent && kind !== 'silent' ? UNKNOWN : find(kind)]));
}
