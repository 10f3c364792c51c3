import { randomUUID } from 'node:crypto';
import { createInterface } from 'node:readline/promises';
import { appendAudit } from '#db/queries/audit';
import { inTransaction } from '#db/queries/connection';
import { insertUser, listUsers } from '#db/queries/users';
import { hashPassword } from '#lib/auth/passwords';
import { SettingsError } from '#lib/config/config';
import { passwordProblem } from '#lib/services/people/passwordRules';

const NAME = 'Administrator';

export async function hasPeople(): Promise<boolean> {
  return (await listUsers()).length > 0;
}

/** Makes the first administrator from the settings, or asks at the terminal for what they leave out. */
export async function ensureFirstAdministrator(given: {
  email: string | null;
  password: string | null;
  /** The password is handed over: it has to be changed at the first sign-in. */
  changesPassword: boolean;
}): Promise<void> {
  const { email, password } = given.email && given.password ? given : await ask(given);
  if (!email || !/^\S+@\S+\.\S+$/.test(email))
    throw new SettingsError(['BITTERN_ADMIN_EMAIL: must be an e-mail address']);
  const problem = passwordProblem(password ?? '', { email, name: NAME, networks: [] });
  if (!password || problem) throw new SettingsError([`BITTERN_ADMIN_PASSWORD: ${problem}`]);
  const passwordHash = await hashPassword(password);
  await inTransaction(async (transaction) => {
    const id = randomUUID();
    const person = { id, email, name: NAME, passwordHash, isAdministrator: true };
    await insertUser({ ...person, mustChangePassword: given.changesPassword }, transaction);
    await appendAudit(
      {
        userId: null,
        networkId: null,
        action: 'person.add',
        subject: `person ${id}`,
        detail: { isAdministrator: true },
      },
      transaction,
    );
  });
}

async function ask(given: { email: string | null; password: string | null }) {
  if (!process.stdin.isTTY) {
    throw new SettingsError([
      'BITTERN_ADMIN_EMAIL and BITTERN_ADMIN_PASSWORD: the first administrator is needed, and there is no terminal to ask at',
    ]);
  }
  const terminal = createInterface({ input: process.stdin, output: process.stdout });
  const email =
    given.email ?? (await terminal.question('E-mail address of the first administrator: ')).trim();
  const password = given.password ?? (await terminal.question('Password (at least 12 characters): '));
  terminal.close();
  return { email, password };
}
