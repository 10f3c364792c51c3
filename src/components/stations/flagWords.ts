import { type FlagName } from '#lib/acoustics/validity';

/** A flag in words, for its check box. */
export const FLAG_WORDS: Readonly<Record<FlagName, string>> = {
  overload: 'overload',
  underrange: 'below range',
  calibration: 'calibration',
  selfcheck: 'self-check',
  rain: 'rain',
  wind: 'wind',
  tamper: 'tampering',
  powerloss: 'power lost',
  clockset: 'clock set',
};
