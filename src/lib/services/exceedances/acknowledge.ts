import { appendAudit } from '#db/queries/audit';
import { inTransaction } from '#db/queries/connection';
import { lockExceedance, updateAcknowledgement, type ExceedanceRow } from '#db/queries/exceedances';
import type { Exceedance, NewAcknowledgement } from '#lib/contracts/exceedances';
import { queueEvents } from '../webhooks/queueEvents';
import { exceedanceView, versionOf } from './view';

export type AcknowledgementOutcome =
  { kind: 'acknowledged'; exceedance: Exceedance } | { kind: 'unknown' } | { kind: 'changed-meanwhile' };

export interface AcknowledgementRequest {
  networkId: number;
  id: number;
  userId: string;
  given: NewAcknowledgement;
  /** By the link of an e-mail, which acknowledges what nobody has yet and changes nothing that was said. */
  isByMailLink?: boolean;
}

/** Acknowledges an exceedance, or changes what was said of it; the audit trail keeps what stood before. */
export async function acknowledge(request: AcknowledgementRequest): Promise<AcknowledgementOutcome> {
  const { networkId, id, userId, given, isByMailLink = false } = request;
  return inTransaction<AcknowledgementOutcome>(
    async (transaction) => {
      const held = await lockExceedance(networkId, id, transaction);
      if (!held) return { kind: 'unknown' };
      if (given.version !== null && given.version !== versionOf(held)) return { kind: 'changed-meanwhile' };
      if (isByMailLink && held.acknowledgedAt) return { kind: 'changed-meanwhile' };
      const { cause, causeDetail, note } = given;
      const now = new Date();
      const fields = { cause, causeDetail, note, acknowledgedBy: userId, acknowledgedAt: now };
      await updateAcknowledgement(id, fields, transaction);
      if (!held.acknowledgedAt) {
        const event = { exceedanceId: id, kind: 'acknowledged' as const, key: `acknowledged/${id}` };
        await queueEvents(networkId, [event], now, transaction);
      }
      await appendAudit(
        {
          userId,
          networkId,
          action: held.acknowledgedAt ? 'exceedance.acknowledge-again' : 'exceedance.acknowledge',
          subject: `exceedance ${id}`,
          detail: {
            station: held.stationCode,
            revision: held.revision,
            before: saidBefore(held),
            after: { cause, causeDetail, note },
            ...(isByMailLink ? { by: 'mail link' } : {}),
          },
        },
        transaction,
      );
      const acknowledged = await lockExceedance(networkId, id, transaction);
      if (!acknowledged) throw new Error(`Exceedance ${id} is not there although it was acknowledged.`);
      return { kind: 'acknowledged', exceedance: exceedanceView(acknowledged) };
    },
    { isolationLevel: 'read committed' },
  );
}

function saidBefore({ acknowledgedAt, cause, causeDetail, note }: ExceedanceRow) {
  return acknowledgedAt && { at: acknowledgedAt.toISOString(), cause, causeDetail, note };
}

/** Why an acknowledgement was not kept, and what to do. */
export const CHANGED_MEANWHILE =
  'The exceedance was revised, or somebody else acknowledged it, after you opened it. Nothing was saved: read it as it is now, then save again.';
