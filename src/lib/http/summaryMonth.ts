import { month as monthSchema } from '#lib/contracts/summaries';
import { notFound } from './problem';

/** The month in an address. @throws {Problem} 404 for what is none. */
export function monthOf(text: string | undefined): string {
  const parsed = monthSchema.safeParse(text);
  if (!parsed.success) throw notFound('A month is written such as 2026-03.');
  return parsed.data;
}
