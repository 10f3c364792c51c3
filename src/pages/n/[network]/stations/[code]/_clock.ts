import { clockEpisodeSchema, newClockShiftSchema, shiftReversalSchema } from '#lib/contracts/clockShifts';
import { formatInstantUtc } from '#lib/contracts/common';
import { typedNumber, type FormValues } from '#lib/http/forms';
import { idOf, valueOf } from '#lib/http/outcome';
import { invalidFields } from '#lib/http/problem';
import { makeShift } from '#lib/services/clockShifts/make';
import { reverseShift } from '#lib/services/clockShifts/reverse';
import { parseUrlInstant } from '#lib/time/urlPeriod';

const MOVING =
  'The intervals are being moved. Figures follow within minutes; it can be put back here as one step.';
const GOING_BACK = 'The intervals are being put back. Figures follow within minutes.';

/** What was typed as an episode. @throws {Problem} with the fields to put right. */
export function typedEpisode({ text }: FormValues, zone: string) {
  return clockEpisodeSchema.parse(episodeFields(text, zone));
}

/** Does what the page's forms ask for. @returns what to tell. */
export async function actOnClock(
  values: FormValues,
  station: Parameters<typeof makeShift>[0],
  { zone, userId }: { zone: string; userId: string },
): Promise<string> {
  const { text } = values;
  if (text['act'] === 'reverse') {
    const why = shiftReversalSchema.safeParse({ reason: text['why'] ?? '' });
    if (!why.success) throw invalidFields([{ field: 'why', message: 'say why' }]);
    valueOf(await reverseShift(station, idOf(text['id']), why.data.reason, userId));
    return GOING_BACK;
  }
  const asked = newClockShiftSchema.parse({ ...episodeFields(text, zone), reason: text['reason'] ?? '' });
  valueOf(await makeShift(station, asked, userId, Math.floor(Date.now() / 1000)));
  return MOVING;
}

function episodeFields(text: FormValues['text'], zone: string) {
  const instantOf = (name: string) => {
    const sec = parseUrlInstant(text[name] ?? '', zone);
    return sec === null ? null : formatInstantUtc(sec);
  };
  const [from, to] = [instantOf('from'), instantOf('to')];
  const receivedFrom = instantOf('receivedFrom');
  const problems = [
    from === null && { field: 'from', message: 'give it as date and time of day' },
    to === null && { field: 'to', message: 'give it as date and time of day' },
    receivedFrom === null &&
      (text['receivedFrom'] ?? '') !== '' && {
        field: 'receivedFrom',
        message: 'give it as date and time of day, or leave it empty',
      },
  ].filter((problem) => problem !== false);
  if (problems.length > 0) throw invalidFields(problems);
  return { from, to, shiftSeconds: typedNumber(text['shiftSeconds']), receivedFrom };
}
