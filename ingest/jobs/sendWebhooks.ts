import { sendDueWebhook } from '#ingest/notify/sendWebhooks';
import { config } from '#lib/config/index';

const holder = `${process.pid}-${Date.now().toString(36)}`;

/** Posts events that are due to webhooks. @returns how many. */
export function sendWebhooks(now: Date): Promise<number> {
  return sendDueWebhook({ holder, mayLoopBack: config().webhooksMayLoopBack }, now);
}
