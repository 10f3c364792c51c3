import { findAuditBreak } from '#db/queries/audit';
import {
  countAudit,
  listAudit,
  listAuditActions,
  type AuditFilter,
  type AuditRecord,
} from '#db/queries/auditLog';
import { listNetworks } from '#db/queries/networks';
import { listUsers } from '#db/queries/users';
import { detailLines } from './detailText';

/** An act with the names that its ids stand for. */
export interface Act {
  id: number;
  at: Date;
  /** Null: Bittern itself, or a monitor. */
  person: { id: string; name: string } | null;
  /** Where the person acted from. */
  fromAddress: string | null;
  network: { slug: string; name: string } | null;
  action: string;
  /** In words; a person is named, as long as there is one of this id. */
  subject: string;
  /** The person that it was done to. */
  subjectPersonId: string | null;
  details: string[];
}

/** Acts that fit, newest first, and the id to go on before; null at the end. */
export async function auditTrail(
  filter: AuditFilter,
  limit: number,
): Promise<{ acts: Act[]; nextBeforeId: number | null }> {
  const [records, users, networks] = await Promise.all([
    listAudit(filter, limit + 1),
    listUsers(),
    listNetworks(),
  ]);
  const names = new Map(users.map(({ id, name }) => [id, name]));
  const byId = new Map(networks.map((network) => [network.id, network]));
  const acts = records.slice(0, limit).map((record) => actOf(record, names, byId));
  return { acts, nextBeforeId: records.length > limit ? (acts.at(-1)?.id ?? null) : null };
}

/** What the trail can be filtered by. */
export async function auditChoices() {
  const [people, networks, actions] = await Promise.all([listUsers(), listNetworks(), listAuditActions()]);
  return { people, networks, actions };
}

/** Reads the whole chain: how many acts it holds, and the first that does not fit, or null. */
export async function verifyChain(): Promise<{ acts: number; brokenAt: number | null }> {
  const acts = await countAudit();
  return { acts, brokenAt: await findAuditBreak() };
}

function actOf(
  record: AuditRecord,
  names: ReadonlyMap<string, string>,
  networks: ReadonlyMap<number, { slug: string; name: string }>,
): Act {
  const { id, at, userId, fromAddress, networkId, action, subject, detail } = record;
  const personId = /^person (\S+)$/.exec(subject)?.[1];
  const isKnown = personId !== undefined && names.has(personId);
  return {
    id,
    at,
    person: userId === null ? null : { id: userId, name: names.get(userId) ?? userId },
    fromAddress,
    network: networkId === null ? null : (networks.get(networkId) ?? null),
    action,
    subject: isKnown ? `person ${names.get(personId)}` : subject,
    subjectPersonId: isKnown ? personId : null,
    details: detailLines(detail),
  };
}
