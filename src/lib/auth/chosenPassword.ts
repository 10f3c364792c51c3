import { invalidFields } from '#lib/http/problem';
import { passwordProblem, type PasswordContext } from '#lib/services/people/passwordRules';
import { hashPassword } from './passwords';

/** The hash of a new password that keeps the rules. @throws {Problem} 422 with the field that it was given in. */
export async function hashChosen(password: string, context: PasswordContext, field: string): Promise<string> {
  const problem = passwordProblem(password, context);
  if (problem) throw invalidFields([{ field, message: problem }]);
  return hashPassword(password);
}
