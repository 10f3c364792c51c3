import { release } from '#ingest/quarantine/release';
import { replaceStored } from '#ingest/quarantine/replace';
import { releaseWords, settledWords } from '#components/quarantine/words.ts';
import { reasonText } from '#lib/contracts/common';
import { type ReleaseOutcome } from '#lib/contracts/quarantine';
import { type FormValues } from '#lib/http/forms';
import { invalidFields, Problem } from '#lib/http/problem';
import { type Choice } from '#lib/services/quarantine/choice';
import { dismiss, reopen } from '#lib/services/quarantine/settle';

interface By {
  userId: string;
  networkId: number;
}

/** What was done, in words for the page that is shown next. */
export type Done = { words: string };

/** Does what a form of the quarantine asks with the records of a choice. @throws {Problem} with what can be put right. */
export async function actOnQuarantine({ text }: FormValues, choice: Choice, by: By): Promise<Done> {
  switch (text['action']) {
    case 'release': {
      return { words: releaseWords(await release(choice, { ...by, reason: null }, new Date())) };
    }
    case 'replace': {
      const outcome = await replaceStored(onlyId(choice), { ...by, reason: reasonOf(text) }, new Date());
      return { words: replaceWords(outcome) };
    }
    case 'dismiss':
      return { words: settledWords('dismissed', await dismiss(choice, { ...by, reason: reasonOf(text) })) };
    case 'reopen':
      return { words: settledWords('reopened', await reopen(choice, by)) };
    default:
      throw invalidFields([{ field: '', message: 'The form did not say what to do. Nothing was changed.' }]);
  }
}

function reasonOf(text: FormValues['text']): string {
  const parsed = reasonText.safeParse(text['reason']);
  if (parsed.success) return parsed.data;
  throw invalidFields([{ field: 'reason', message: parsed.error.issues[0]?.message ?? 'is missing' }]);
}

function onlyId(choice: Choice): number {
  const [id] = 'ids' in choice ? choice.ids : [];
  if (id === undefined)
    throw invalidFields([{ field: '', message: 'Replacing is for one record at a time.' }]);
  return id;
}

function replaceWords({ refused, passedOver }: ReleaseOutcome): string {
  const [why] = refused;
  if (why) throw new Problem(409, 'still-refused', 'Still refused', `Not taken: ${why.detail}`);
  return passedOver > 0
    ? 'Nothing was changed: somebody settled the record meanwhile.'
    : 'Stored. The interval that it replaced is kept as superseded.';
}
