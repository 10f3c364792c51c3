import { flagNames } from '#lib/acoustics/validity';
import { type TroubleKind } from '#lib/contracts/health';
import { formatDuration } from '#lib/format/durations';
import { formatCoverage, formatDifferenceDb } from '#lib/format/levels';

interface Found {
  kind: TroubleKind;
  measured: number | null;
  bound: number | null;
}

const decimal = (value: number | null) => (value === null ? '' : value.toFixed(1));

/** What is wrong, in a few words: "Battery at 11.2 V, less than 11.8 V". */
export function troubleWhat({ kind, measured, bound }: Found): string {
  switch (kind) {
    case 'silent':
      return 'Silent: no data come';
    case 'clock':
      return measured === null
        ? 'Clock ahead: data from the future were refused'
        : `Clock ${formatDuration(Math.abs(measured))} ${measured > 0 ? 'ahead' : 'slow'}`;
    case 'frozen':
      return 'Levels do not change at all, in any band';
    case 'bands':
      return `LAeq and bands differ by more than 1 dB in ${formatCoverage(measured ?? 0)} of the intervals`;
    case 'floor':
      return `The quiet of the last day is ${formatDifferenceDb(measured ?? 0)} dB against the usual`;
    case 'flags':
      return `Flags that are not expected here, in a tenth of the newest hour or more: ${flagNames(measured ?? 0).join(', ')}`;
    case 'battery':
      return `Battery at ${decimal(measured)} V, less than ${decimal(bound)} V`;
    case 'late':
      return `Data come late: the newest are ${formatDuration(measured ?? 0)} old`;
    case 'coverage':
      return `Only ${formatCoverage(measured ?? 0)} of the last 24 hours received, less than ${formatCoverage(bound ?? 0)}`;
    case 'wind':
      return `Wind speed has stayed at exactly ${decimal(measured)} m/s for ${formatDuration(bound ?? 0)}`;
    case 'drift':
      return `Nightly background has moved by ${formatDifferenceDb(measured ?? 0)} dB against the neighbouring stations, beyond the bound of ${decimal(bound)} dB`;
    case 'selfcheck':
      return `Self-checks have moved by ${formatDifferenceDb(measured ?? 0)} dB, beyond the bound of ${decimal(bound)} dB`;
  }
}

const ADVICE: Record<TroubleKind, string> = {
  silent:
    'Look whether other stations nearby are silent too (the mobile network), then at power and link on site. What it keeps comes later by itself.',
  clock:
    'Set the monitor’s clock, or let it set itself by the network. Data of the time before may be shifted: exclude them if it matters.',
  frozen: 'Restart the monitor, then check it with the calibrator. Exclude the frozen time.',
  bands: 'Look whether the monitor sends unweighted (Z) band levels and all of its bands.',
  floor: 'Look at microphone, windscreen and cable, and check with the calibrator.',
  flags:
    'Look on site at what the flag tells of. If it is ordinary at this place, tick it as expected in the station’s settings; intervals count as the validity rules say, whatever is ticked.',
  battery: 'Look at the charger or the solar panel; change the battery before the monitor stops.',
  late: 'The monitor is catching up or the link is poor. Wait; if it lasts, look at the link.',
  coverage:
    'See in the coverage calendar what is missing, and fetch it from the instrument’s card if it is there.',
  drift:
    'Look whether something new sounds, or has fallen silent, at this place at night. If not, check with the calibrator before the next check is due. Nothing is corrected by it.',
  selfcheck:
    'Check with the calibrator before the next check is due: the microphone may be going off. Nothing is corrected by it.',
  wind: 'The wind sensor is stuck or iced: until it is free, wind cannot leave intervals out by itself.',
};

/** What to do about it. */
export function troubleAdvice(kind: TroubleKind): string {
  return ADVICE[kind];
}
