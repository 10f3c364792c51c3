import { withdrawalSchema } from '#lib/contracts/exclusions';
import { withdraw } from '#lib/services/exclusions/withdraw';

interface Who {
  networkId: number;
  userId: string;
  /** Whether the person holds the role for it. */
  mayExclude: boolean;
}

/** Withdraws the exclusion that a station page's form names: done, or the words to show beside it. */
export async function withdrawFromForm(
  form: FormData,
  { networkId, userId, mayExclude }: Who,
): Promise<'done' | { id: number; words: string }> {
  const id = Number(form.get('exclusion'));
  if (!mayExclude) return { id, words: 'Only an operator may withdraw an exclusion.' };
  const given = withdrawalSchema.safeParse({ reason: form.get('reason') });
  if (!given.success) return { id, words: 'Give the reason, in at most 500 characters.' };
  if (!Number.isSafeInteger(id)) return { id, words: 'The network has no such exclusion.' };
  const { outcome } = await withdraw({ networkId, id, reason: given.data.reason, userId });
  if (outcome === 'unknown') return { id, words: 'The network has no such exclusion.' };
  // Withdrawn meanwhile by somebody else: what was wanted has come about.
  return 'done';
}
