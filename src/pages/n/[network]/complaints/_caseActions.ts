import { fieldErrors, typedFields, type FieldErrors } from '#components/complaints/complaintForm.ts';
import type { NetworkAccess } from '#lib/auth/networkAccess';
import { localDate } from '#lib/contracts/common';
import { CLOSING_REASONS, contactSchema } from '#lib/contracts/complaints';
import type { Decision } from '#lib/services/complaints/answer/decideAnswer';
import { closeByReference, correctByReference, eraseByReference } from '#lib/services/complaints/caseActs';
import { notePosted, resendReply } from '#lib/services/complaints/deliverReply';
import { fileMessage, noteReceived, withdrawFiled } from '#lib/services/complaints/received/fileReceived';
import { parseUrlInstant } from '#lib/time/urlPeriod';

const CONTACT_FIELDS = ['name', 'email', 'phone', 'address'] as const;
export type TypedContact = Record<(typeof CONTACT_FIELDS)[number], string>;

/** What a form of the case page came to: done, or what to show again with everything that was typed. */
export type ActionOutcome =
  | { kind: 'done' }
  | { kind: 'unknown' }
  | { kind: 'contact-refused'; typed: TypedContact; errors: FieldErrors }
  | { kind: 'refused'; message: string };

/** Does what a form of the case page asks. The caller has made sure that the person is liaison or administrator. */
export async function actOnCase(
  form: FormData,
  userId: string,
  network: NetworkAccess['network'],
  reference: string,
  zone: string,
): Promise<ActionOutcome> {
  switch (form.get('action')) {
    case 'resend':
    case 'posted':
    case 'not-posted':
      return deliver(form, userId, network, reference);
    case 'received-message':
    case 'received-note':
    case 'received-withdraw':
      return receive(form, { userId, network, reference }, zone);
    case 'contact':
      return correct(form, userId, network, reference);
    case 'close':
      return close(form, userId, network, reference);
    case 'erase':
      return erase(form, userId, network, reference);
    default:
      return { kind: 'refused', message: 'The form did not say what to do. Nothing was changed.' };
  }
}

function deliver(
  form: FormData,
  userId: string,
  network: NetworkAccess['network'],
  reference: string,
): Promise<Decision> {
  const act = { userId, network, reference, replyId: Number(form.get('reply')) };
  if (form.get('action') === 'resend') return resendReply(act, new Date());
  if (form.get('action') === 'not-posted') return notePosted(act, null);
  const on = localDate.safeParse(form.get('on'));
  if (on.success) return notePosted(act, on.data);
  return Promise.resolve({ kind: 'refused', message: 'Say on which date it was posted. Nothing was noted.' });
}

async function receive(
  form: FormData,
  who: { userId: string; network: NetworkAccess['network']; reference: string },
  zone: string,
): Promise<Decision> {
  if (form.get('action') === 'received-withdraw') return withdrawFiled(who, Number(form.get('received')));
  if (form.get('action') === 'received-note') {
    const { note, at } = typedFields(form, ['note', 'at']);
    const sec = parseUrlInstant(at, zone);
    return noteReceived(who, note, new Date((sec ?? NaN) * 1000), new Date());
  }
  const file = form.get('message');
  if (!(file instanceof File) || file.size === 0) {
    return { kind: 'refused', message: 'No file was chosen. Nothing was filed.' };
  }
  return fileMessage(who, Buffer.from(await file.arrayBuffer()));
}

async function correct(
  form: FormData,
  userId: string,
  network: NetworkAccess['network'],
  reference: string,
): Promise<ActionOutcome> {
  const typed = typedFields(form, CONTACT_FIELDS);
  const parsed = contactSchema.safeParse({ ...typed, email: typed.email.trim() });
  if (!parsed.success) return { kind: 'contact-refused', typed, errors: fieldErrors(parsed.error) };
  const outcome = await correctByReference(userId, network, reference, parsed.data);
  if (outcome !== 'erased') return { kind: outcome };
  return { kind: 'refused', message: 'The personal data have been erased. Nothing was changed.' };
}

async function close(
  form: FormData,
  userId: string,
  network: NetworkAccess['network'],
  reference: string,
): Promise<ActionOutcome> {
  const reason = CLOSING_REASONS.find((known) => known === form.get('reason'));
  if (!reason || reason === 'erased') {
    return { kind: 'refused', message: 'Choose why no answer is sent. The complaint was not closed.' };
  }
  const outcome = await closeByReference(userId, network, reference, reason);
  if (outcome !== 'not-open') return { kind: outcome };
  return { kind: 'refused', message: 'The complaint was no longer open. Nothing was changed.' };
}

async function erase(
  form: FormData,
  userId: string,
  network: NetworkAccess['network'],
  reference: string,
): Promise<ActionOutcome> {
  const confirmation = form.get('confirmation');
  if (typeof confirmation !== 'string' || confirmation.trim().toUpperCase() !== reference.toUpperCase()) {
    return { kind: 'refused', message: `Nothing was erased: type ${reference} to confirm.` };
  }
  return { kind: await eraseByReference(userId, network, reference) };
}
