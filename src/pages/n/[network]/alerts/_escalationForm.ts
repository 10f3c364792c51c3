import { escalationStepSchema, MOST_STEPS, type EscalationStepInput } from '#lib/contracts/alerts';
import { typedNumber, type FormValues } from '#lib/http/forms';
import { invalidFields } from '#lib/http/problem';

export const STEPS = Array.from({ length: MOST_STEPS }, (_, index) => index + 1);

/** The steps that the form has filled in, in their order. @throws {Problem} 422 with every field that is wrong. */
export function stepsFromForm({ text, all }: FormValues): EscalationStepInput[] {
  const problems: { field: string; message: string }[] = [];
  const steps: EscalationStepInput[] = [];
  for (const step of STEPS) {
    const afterMinutes = typedNumber(text[`after${step}`]);
    const people = all(`people${step}`);
    if (afterMinutes === undefined && people.length === 0) continue;
    const parsed = escalationStepSchema.safeParse({ afterMinutes, people });
    if (parsed.success) steps.push(parsed.data);
    else {
      problems.push(
        ...parsed.error.issues.map(({ path, message }) => ({
          field: `${path[0] === 'people' ? 'people' : 'after'}${step}`,
          message,
        })),
      );
    }
  }
  if (problems.length > 0) throw invalidFields(problems);
  return steps;
}
