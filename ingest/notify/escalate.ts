import { listAlertPeople, type AlertPerson } from '#db/queries/alertPreferences';
import { claimTelling, findTold } from '#db/queries/alertTellings';
import { inTransaction, type Connection } from '#db/queries/connection';
import {
  listEscalatingNetworks,
  listEscalationSteps,
  listUnacknowledged,
  type EscalationStep,
} from '#db/queries/escalation';
import { insertExceedanceMails } from '#db/queries/exceedanceMails';
import { findExceedance, type ExceedanceRow } from '#db/queries/exceedances';
import { findNetworkById, type NetworkRow } from '#db/queries/networks';
import { insertMail } from '#db/queries/outbox';
import { config } from '#lib/config/index';
import { TELL_WITHIN_HOURS } from '#lib/contracts/limits';
import { acknowledgeUrl } from '#lib/services/alerts/acknowledgeLink';
import { concernsEverybody, eachAlone, networkSubject } from '../jobs/alone';
import { describeExceedance } from './describeExceedance';
import { exceedanceMail } from './exceedanceMail';
import { messageIdOf } from '#lib/services/mails/messageId';

const JOB = 'escalate';
/** A worker that was away so long does not wake people for what is past. */
const AT_MOST_LATE_MS = 24 * 3_600_000;

/**
 * Tells the people of each step that is due of exceedances that nobody has acknowledged, in one message where all can be described.
 * @returns how many messages were told.
 */
export async function escalate(now: Date): Promise<number> {
  const escalateNetwork = async (networkId: number) => {
    const network = await findNetworkById(networkId);
    if (!network) return 0;
    let told = 0;
    for (const step of await listEscalationSteps(networkId)) told += await takeStep(network, step, now);
    return told;
  };
  const subjectOf = (id: number) => networkSubject({ id });
  return eachAlone(JOB, await listEscalatingNetworks(), subjectOf, escalateNetwork, now);
}

const subjectOf = (exceedanceId: number, { step }: EscalationStep) => `${exceedanceId}/${step}`;

async function takeStep(network: NetworkRow, step: EscalationStep, now: Date): Promise<number> {
  const to = new Date(now.getTime() - step.afterMin * 60_000);
  const from = new Date(Math.max(step.changedAt.getTime(), to.getTime() - AT_MOST_LATE_MS));
  const withinSec = TELL_WITHIN_HOURS * 3600;
  const ids = from > to ? [] : await listUnacknowledged(network.id, { from, to, withinSec });
  const before = await findTold(
    'escalation',
    ids.map((id) => subjectOf(id, step)),
  );
  const due = ids.filter((id) => !before.has(subjectOf(id, step)));
  if (due.length === 0) return 0;
  try {
    return await tellTogether(network, step, due, now);
  } catch (error) {
    if (concernsEverybody(error)) throw error;
  }
  return eachAlone(
    JOB,
    due,
    (id) => ({ name: `exceedance ${id}, step ${step.step}`, networkId: network.id }),
    (id) => tellTogether(network, step, [id], now),
    now,
  );
}

/** @returns 1, or 0 when nobody is told of any. */
function tellTogether(
  network: NetworkRow,
  step: EscalationStep,
  due: readonly number[],
  now: Date,
): Promise<number> {
  return inTransaction(
    async (transaction) => {
      const rows: ExceedanceRow[] = [];
      for (const id of due) {
        const row = await findExceedance(network.id, id, transaction);
        const isOpen = row && row.acknowledgedAt === null && row.state === 'standing';
        if (isOpen && (await claimTelling('escalation', subjectOf(id, step), now, transaction)))
          rows.push(row);
      }
      if (rows.length > 0) await tellStep(network, step, rows, now, transaction);
      return rows.length > 0 ? 1 : 0;
    },
    { isolationLevel: 'read committed' },
  );
}

/** People of the step who may still acknowledge; who has left meanwhile is passed over. */
async function tellStep(
  network: NetworkRow,
  step: EscalationStep,
  rows: readonly ExceedanceRow[],
  now: Date,
  transaction: Connection,
): Promise<void> {
  const people = await listAlertPeople(network.id, transaction);
  const named = people.filter(({ userId, isOperator }) => isOperator && step.userIds.includes(userId));
  for (const person of named) await putEscalation(network, step, { rows, person, now }, transaction);
}

async function putEscalation(
  network: NetworkRow,
  { step, afterMin }: EscalationStep,
  { rows, person, now }: { rows: readonly ExceedanceRow[]; person: AlertPerson; now: Date },
  transaction: Connection,
): Promise<void> {
  const base = `${config().origin}/n/${network.slug}`;
  const nowSec = Math.floor(now.getTime() / 1000);
  const changes = [];
  for (const row of rows) {
    const words = await describeExceedance(row, network, transaction);
    changes.push({ ...words, acknowledgeUrl: acknowledgeUrl(row.id, person.userId, nowSec) });
  }
  const key = rows.map(({ id }) => id).join(',');
  const messageId = messageIdOf(`escalation:${network.id}:${step}:${key}:${person.email}`);
  const content = exceedanceMail(changes, {
    subject: { before: 'Not acknowledged: ', several: `${rows.length} exceedances in ${network.name}` },
    opening: `Nobody has acknowledged ${rows.length === 1 ? 'this exceedance' : 'these exceedances'} for ${afterMin} minutes.`,
    closing: [`You get this because you are named in step ${step} of the network: ${base}/alerts/escalation`],
    listUrl: `${base}/exceedances?acknowledged=no`,
  });
  const mail = { ...content, messageId, dedupeKey: `escalation:${messageId}`, recipient: person.email };
  const mailId = await insertMail({ ...mail, networkId: network.id, kind: 'escalation' }, transaction);
  const ids = rows.map(({ id }) => id);
  if (mailId !== null) await insertExceedanceMails(mailId, ids, transaction);
}
