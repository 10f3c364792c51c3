import type { NetworkAccess } from '#lib/auth/networkAccess';
import type { PostedForm } from '#lib/http/forms';
import { packItemsSchema } from '#lib/contracts/evidencePack';
import {
  approveAnswer,
  discardAnswer,
  returnAnswer,
  sendAnswer,
  submitAnswer,
  type Decision,
} from '#lib/services/complaints/answer/decideAnswer';
import { keepAnswer, type AnswerEntry, type KeepOutcome } from '#lib/services/complaints/answer/keepAnswer';

/** What an act on the page of an answer came to. `typed`: what was typed and could not be kept. */
export type AnswerActOutcome =
  | { kind: 'kept' }
  | { kind: 'gone'; to: 'case' }
  | { kind: 'unknown' }
  | { kind: 'refused'; message: string; typed: AnswerEntry | null };

const UNKEPT: Readonly<Record<Exclude<KeepOutcome['kind'], 'kept' | 'unknown'>, string>> = {
  'changed-meanwhile':
    'Somebody else kept another text meanwhile. Yours was not kept: it stands below; open the page anew to see theirs.',
  submitted: 'This answer waits for a second person. Yours was not kept: take it back first.',
  closed: 'This complaint is closed. Nothing was kept.',
  erased: 'The personal data have been erased: there is nobody to write to.',
};

interface Acting {
  userId: string;
  network: NetworkAccess['network'];
  reference: string;
}

/** Does what a form of the page of an answer asks. The caller has made sure that the person may answer. */
export async function actOnAnswer(form: PostedForm, who: Acting): Promise<AnswerActOutcome> {
  const now = new Date();
  const revision = Number(form.text['revision'] ?? 0);
  const act = { ...who, revision };
  switch (form.text['action']) {
    case 'send':
      return ended(await sendAnswer(act, form.text['figuresDigest'] ?? '', now));
    case 'approve':
      return ended(await approveAnswer(act, now));
    case 'discard':
      return ended(await discardAnswer(act));
    case 'submit':
      return stays(await submitAnswer(act, now));
    case 'return':
      return stays(await returnAnswer(act));
    default:
      return keep(form, who, revision);
  }
}

async function keep(form: PostedForm, who: Acting, revision: number): Promise<AnswerActOutcome> {
  const template = Number(form.text['template'] ?? '');
  const items = packItemsSchema.safeParse(form.all('item'));
  const entry: AnswerEntry = {
    body: form.text['body'] ?? '',
    items: items.success ? items.data : [],
    templateVersionId: Number.isInteger(template) && template > 0 ? template : null,
    revision,
  };
  const outcome = await keepAnswer(who.userId, who.network, who.reference, entry);
  if (outcome.kind === 'kept') return { kind: 'kept' };
  if (outcome.kind === 'unknown') return outcome;
  return { kind: 'refused', message: UNKEPT[outcome.kind], typed: entry };
}

function ended(decision: Decision): AnswerActOutcome {
  if (decision.kind === 'done') return { kind: 'gone', to: 'case' };
  return decision.kind === 'unknown' ? decision : { ...decision, typed: null };
}

function stays(decision: Decision): AnswerActOutcome {
  if (decision.kind === 'done') return { kind: 'kept' };
  return decision.kind === 'unknown' ? decision : { ...decision, typed: null };
}
