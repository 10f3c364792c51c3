import type { Content } from 'pdfmake/interfaces';
import type { StationEvidence } from '#lib/contracts/complaintEvidence';
import { heading, paragraph, typeset } from '../../summaries/pdf/typography';

const NOT_ASSESSABLE: Readonly<Record<Exclude<StationEvidence['tonality'], 'assessed'>, string>> = {
  'octave-bands': 'Octave bands are too wide to tell whether a tone stood out.',
  'no-neighbours': 'Too few bands were measured to tell whether a tone stood out.',
  'averaged-too-short': 'Less than a minute was measured: too short to tell whether a tone stood out.',
  'no-data': 'There are no valid data to tell whether a tone stood out.',
};

/** What stands out of the mean spectrum, tones by the survey method, low frequencies. */
export function soundSection({ name, tonality, tones, context }: StationEvidence): Content[] {
  const standing = context?.standingOut ?? [];
  const low = context?.lowFrequency;
  return [
    heading('What stands out'),
    paragraph(
      tonality !== 'assessed'
        ? NOT_ASSESSABLE[tonality]
        : tones.length === 0
          ? `No tone in the mean spectrum of ${name} by the survey method of ISO 1996-2.`
          : `Tones in the mean spectrum of ${name} by the survey method of ISO 1996-2: ${tones.map(toneText).join('; ')}.`,
    ),
    ...(standing.length === 0
      ? []
      : [{ ul: standing.map(({ words }) => typeset(`${words}.`)), margin: [0, 0, 0, 5] } as Content]),
    paragraph(
      low
        ? `LCeq − LAeq is ${low.difference.toFixed(1)} dB, ${low.isAbove ? 'above' : 'not above'} the ${low.bound} dB from which low ` +
            'frequencies deserve a look.'
        : 'The low-frequency indicator LCeq − LAeq cannot be told: the monitor sent no LCeq for all of the time.',
    ),
  ];
}

function toneText({ lowerHz, upperHz, excess, method }: StationEvidence['tones'][number]): string {
  const range = `${hertz(lowerHz)} to ${hertz(upperHz)} Hz, ${excess.toFixed(1)} dB above its neighbours`;
  return method === 'survey' ? range : `${range} (two adjacent bands together, a rule of our own)`;
}

function hertz(value: number): string {
  return value < 100 ? value.toFixed(1) : value.toFixed(0);
}
