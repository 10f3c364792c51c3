import { type InvalidityReason } from '#lib/acoustics/validity';

/** Why an interval does not count, in words. */
export const INVALIDITY_WORDS: Record<InvalidityReason, string> = {
  calibration: 'calibration',
  selfcheck: 'self-check',
  overload: 'overload',
  tamper: 'tampering',
  powerloss: 'power loss',
  clockset: 'clock was set',
  wind: 'flagged wind',
  'wind-speed': 'wind above the bound by the station’s own sensor',
  rain: 'rain flagged by the station',
  exclusion: 'excluded by an operator',
  'mast-wind': 'wind above the bound at the mast',
  'mast-rain': 'rain at the mast',
};
