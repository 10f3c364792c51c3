import { appendAudit } from '#db/queries/audit';
import { inTransaction } from '#db/queries/connection';
import { isKnownDevice, listKnownKinds, noteOrigins, type Origin } from '#db/queries/knownOrigins';
import { secretDigest } from '#db/queries/secretDigest';
import { agentWords } from '#lib/format/agentWords';
import { purposeMac } from '../purposeMac';
import { tellPerson } from './accountMail';

/** Where somebody signs in from. */
export interface SignInOrigin {
  address: string;
  /** What the browser says it is. */
  agent: string | null;
  /** The cookie by which a browser is known again; null where it has none. */
  device: string | null;
}

/** Whether this browser has signed the person of this address in before. */
export async function isOwnDevice(email: string, device: string | null): Promise<boolean> {
  return device !== null && isKnownDevice(email, secretDigest(device));
}

/**
 * Remembers where a person signed in from, and tells the person of what is new: an address, or a browser that was not seen there
 * before. A browser that lost its cookie is not told of at the address where it is usual: the message could not tell it from itself.
 */
export async function noteSignIn(
  person: { id: string; email: string },
  { address, addressKey, agent, device }: SignInOrigin & { device: string; addressKey: string },
  hadSecondFactor: boolean,
): Promise<void> {
  const origins: Origin[] = [
    { kind: 'device', digest: secretDigest(device) },
    { kind: 'address', digest: purposeMac('known address', addressKey) },
    { kind: 'place', digest: purposeMac('known place', `${addressKey} ${agent ?? ''}`) },
  ];
  const at = new Date();
  await inTransaction(async (transaction) => {
    const known = await listKnownKinds(person.id, origins, transaction);
    const isNewAddress = !known.includes('address');
    await noteOrigins(person.id, origins, at, transaction);
    if (isNewAddress || !(known.includes('device') || known.includes('place'))) {
      const news = { kind: 'sign-in', browser: agentWords(agent), address, isNewAddress } as const;
      await tellPerson(person.email, news, at, transaction);
    }
    const entry = { userId: person.id, networkId: null, action: 'session.begin' };
    const detail = { secondFactor: hadSecondFactor };
    await appendAudit({ ...entry, subject: `person ${person.id}`, detail }, transaction);
  });
}
