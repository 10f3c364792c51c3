import { hash, verify } from '@node-rs/argon2';

/** Argon2id with the parameters that OWASP's password storage guidance gives first (19 MiB, 2 passes, 1 lane). */
const ARGON2_OPTIONS = { memoryCost: 19_456, timeCost: 2, parallelism: 1 } as const;

/** Hash to store for a password. */
export function hashPassword(password: string): Promise<string> {
  return hash(password, ARGON2_OPTIONS);
}

/** Whether a password belongs to a stored hash. */
export function verifyPassword(passwordHash: string, password: string): Promise<boolean> {
  return verify(passwordHash, password);
}
