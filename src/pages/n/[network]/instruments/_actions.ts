import {
  deploymentWithdrawalSchema,
  instrumentChangesSchema,
  newDeploymentSchema,
} from '#lib/contracts/instruments';
import { formatInstantUtc } from '#lib/contracts/common';
import { typedNumber, type FormValues } from '#lib/http/forms';
import { idOf, valueOf } from '#lib/http/outcome';
import { badRequest, invalidFields } from '#lib/http/problem';
import { changeInstrument } from '#lib/services/instruments/change';
import { endStay, withdrawStay } from '#lib/services/instruments/changeStay';
import { deploy } from '#lib/services/instruments/deploy';
import { parseUrlInstant } from '#lib/time/urlPeriod';

interface Setting {
  networkId: number;
  instrumentId: number;
  userId: string;
  zone: string;
}

/**
 * Does what a form of an instrument's page asks. The caller has made sure that the person is an operator.
 * @throws {Problem} and zod errors, with what is wrong by field.
 */
export async function actOnInstrument({ text }: FormValues, setting: Setting): Promise<void> {
  const { networkId, instrumentId, userId, zone } = setting;
  const nowSec = Math.floor(Date.now() / 1000);
  const act = { networkId, instrumentId, userId, nowSec };
  const stayAct = { ...act, deploymentId: idOf(text['stay']) };
  switch (text['act']) {
    case 'deploy':
      valueOf(await deploy(act, newDeploymentSchema.parse(deploymentOf(text, zone))));
      return;
    case 'end':
      valueOf(await endStay(stayAct, typedSec(text['to'], zone, 'to')));
      return;
    case 'withdraw': {
      const { reason } = deploymentWithdrawalSchema.parse({ reason: text['reason'] ?? '' });
      valueOf(await withdrawStay(stayAct, reason));
      return;
    }
    case 'change':
    case 'retire':
    case 'bring-back': {
      const changes = instrumentChangesSchema.parse(changesOf(text));
      valueOf(await changeInstrument({ networkId, id: instrumentId, userId, nowSec }, changes));
      return;
    }
    default:
      throw badRequest('The form did not say what to do. Nothing was changed.');
  }
}

function deploymentOf(text: FormValues['text'], zone: string) {
  return {
    station: text['station'] ?? '',
    from: formatInstantUtc(typedSec(text['from'], zone, 'from')),
    to: text['to'] ? formatInstantUtc(typedSec(text['to'], zone, 'to')) : null,
    note: text['note'] ?? '',
  };
}

function changesOf(text: FormValues['text']) {
  if (text['act'] === 'change') return { ...text, class: typedNumber(text['class']) };
  return { retired: text['act'] === 'retire', reason: text['reason'] ?? '' };
}

/** Epoch seconds of a time as typed, local to `zone` unless it carries an offset. @throws {Problem} 422 */
function typedSec(text: string | undefined, zone: string, field: string): number {
  const sec = parseUrlInstant(text ?? '', zone);
  if (sec === null) {
    throw invalidFields([{ field, message: 'must be a date and time such as 2026-03-17T14:30' }]);
  }
  return sec;
}
