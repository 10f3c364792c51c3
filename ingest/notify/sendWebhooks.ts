import { listAlertPeople } from '#db/queries/alertPreferences';
import { inTransaction, type Connection } from '#db/queries/connection';
import { findNetworkById } from '#db/queries/networks';
import { leaseDueDelivery, settleDelivery, type LeasedDelivery } from '#db/queries/webhookDeliveries';
import { findWebhook, lockWebhook, updateWebhookHealth, type WebhookRow } from '#db/queries/webhooks';
import { putNotes } from '#ingest/health/mail';
import { config } from '#lib/config/index';
import { postOnce, type PostOutcome } from '#lib/services/webhooks/post';
import { signatureFields, webhookSecret } from '#lib/services/webhooks/signature';
import { eachAlone } from '../jobs/alone';
import { waitMs } from './backOff';

export interface WebhookSender {
  /** Names this process; a lease is its own only. */
  holder: string;
  mayLoopBack: boolean;
  /** 0 to 1, by which waits are scattered. */
  random?: () => number;
}

/** Longer than an attempt can take. */
const LEASE_SEC = 60;
const GIVE_UP_AFTER_MS = 24 * 3_600_000;
/** A receiver that failed for so long is not tried again until a person says so. */
const DISABLE_AFTER_MS = 3 * 24 * 3_600_000;
const GONE = 410;

/**
 * Posts the oldest event that is due, signed: at least once, under a fixed id. A receiver that fails is left in peace for a wait that
 * doubles up to about an hour; an event is given up after a day, the receiver after three, or at once when it says 410.
 * @returns how many were tried: 1, or 0 when none is due.
 */
export async function sendDueWebhook(sender: WebhookSender, now: Date): Promise<number> {
  const delivery = await leaseDueDelivery(sender.holder, now, LEASE_SEC);
  if (!delivery) return 0;
  const webhook = await findWebhook(delivery.webhookId);
  if (!webhook) return 1;
  const subject = { name: `webhook ${webhook.id}`, networkId: webhook.networkId };
  const post = async () => {
    const headers = headersOf(webhook, delivery, now);
    await settle(
      delivery,
      await postOnce(webhook.url, delivery.body, headers, sender.mayLoopBack),
      sender,
      now,
    );
    return 1;
  };
  // One that fails unforeseen keeps its lease for a while, so that the next comes first.
  await eachAlone('send-webhooks', [delivery], () => subject, post, now);
  return 1;
}

function headersOf({ id, url, salt }: WebhookRow, { body }: LeasedDelivery, now: Date) {
  const post = { webhookId: id, url, body, secret: webhookSecret(salt) };
  return {
    'Content-Type': 'application/json; charset=utf-8',
    'User-Agent': 'Bittern',
    ...signatureFields(post, Math.floor(now.getTime() / 1000)),
  };
}

async function settle(
  { id, webhookId, createdAt }: LeasedDelivery,
  { status, words }: PostOutcome,
  { holder, random = Math.random }: WebhookSender,
  now: Date,
): Promise<void> {
  const isTaken = status !== null && status >= 200 && status < 300;
  const isOld = now.getTime() - createdAt.getTime() > GIVE_UP_AFTER_MS;
  const state = isTaken ? 'delivered' : isOld || status === GONE ? 'dead' : 'waiting';
  await inTransaction(async (transaction) => {
    const webhook = await lockWebhook(webhookId, transaction);
    const isOurs = await settleDelivery({ id, holder }, { state, outcome: words, at: now }, transaction);
    if (!webhook || !isOurs) return;
    if (isTaken) return updateWebhookHealth(webhookId, healthy(now), transaction);
    const failingSince = webhook.failingSince ?? now;
    const isOver = status === GONE || now.getTime() - failingSince.getTime() > DISABLE_AFTER_MS;
    const health = {
      failures: webhook.failures + 1,
      failingSince,
      nextAttemptAt: new Date(now.getTime() + waitMs(webhook.failures, random)),
      disabledAt: isOver ? now : null,
      disabledReason: isOver ? words : null,
    };
    await updateWebhookHealth(webhookId, health, transaction);
    if (isOver && webhook.disabledAt === null) await tellOperators(webhook, words, now, transaction);
  });
}

function healthy(now: Date) {
  return { failures: 0, failingSince: null, nextAttemptAt: now, disabledAt: null, disabledReason: null };
}

async function tellOperators(
  { id, networkId, url }: WebhookRow,
  reason: string,
  now: Date,
  transaction: Connection,
): Promise<void> {
  const network = await findNetworkById(networkId, transaction);
  if (!network) return;
  const operators = (await listAlertPeople(networkId, transaction)).filter(({ isOperator }) => isOperator);
  const page = `${config().origin}/n/${network.slug}/alerts/webhooks`;
  const note = {
    subject: `${network.name}: events are posted no longer to ${new URL(url).host}`,
    opening:
      'The receiver of a webhook failed too long, so it is not tried any more. E-mails go on as before.',
    facts: [
      ['Address', url],
      ['It last', reason],
    ] as const,
    link: { label: 'Webhooks', url: page },
    closing: 'You get this because you are an operator of the network.',
  };
  const recipients = operators.map(({ email }) => email);
  await putNotes(
    note,
    { networkId, kind: 'webhook', key: `${id}:${now.getTime()}` },
    recipients,
    transaction,
  );
}
