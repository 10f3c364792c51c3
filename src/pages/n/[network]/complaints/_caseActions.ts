import { fieldErrors, typedFields, type FieldErrors } from '#components/complaints/complaintForm.ts';
import type { NetworkAccess } from '#lib/auth/networkAccess';
import { CLOSING_REASONS, contactSchema, newReplySchema } from '#lib/contracts/complaints';
import { answerCase, UNSENT_REASONS } from '#lib/services/complaints/answerCase';
import { closeByReference, correctByReference, eraseByReference } from '#lib/services/complaints/caseActs';

const CONTACT_FIELDS = ['name', 'email', 'phone', 'address'] as const;
export type TypedContact = Record<(typeof CONTACT_FIELDS)[number], string>;

/** What a form of the case page came to: done, or what to show again with everything that was typed. */
export type ActionOutcome =
  | { kind: 'done' }
  | { kind: 'unknown' }
  | { kind: 'reply-refused'; message: string; text: string; figuresChanged: boolean }
  | { kind: 'contact-refused'; typed: TypedContact; errors: FieldErrors }
  | { kind: 'refused'; message: string };

/** Does what a form of the case page asks. The caller has made sure that the person is liaison or administrator. */
export async function actOnCase(
  form: FormData,
  userId: string,
  network: NetworkAccess['network'],
  reference: string,
): Promise<ActionOutcome> {
  switch (form.get('action')) {
    case 'reply':
      return reply(form, userId, network, reference);
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

async function reply(
  form: FormData,
  userId: string,
  network: NetworkAccess['network'],
  reference: string,
): Promise<ActionOutcome> {
  const { text, figuresDigest, repliesSoFar } = typedFields(form, ['text', 'figuresDigest', 'repliesSoFar']);
  const parsed = newReplySchema.safeParse({ text, figuresDigest, repliesSoFar: Number(repliesSoFar) });
  if (!parsed.success) {
    const message = parsed.error.issues[0]?.message ?? 'could not be read';
    return { kind: 'reply-refused', message: `The letter ${message}`, text, figuresChanged: false };
  }
  const outcome = await answerCase(userId, network, reference, parsed.data, new Date());
  if (outcome.kind === 'sent') return { kind: 'done' };
  if (outcome.kind === 'unknown') return outcome;
  return {
    kind: 'reply-refused',
    message: UNSENT_REASONS[outcome.kind],
    text,
    figuresChanged: outcome.kind === 'figures-changed',
  };
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
    return { kind: 'refused', message: 'Choose why no reply is sent. The complaint was not closed.' };
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
