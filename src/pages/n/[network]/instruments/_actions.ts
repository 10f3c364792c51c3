import {
  deploymentWithdrawalSchema,
  instrumentChangesSchema,
  newDeploymentSchema,
} from '#lib/contracts/instruments';
import { formatInstantUtc } from '#lib/contracts/common';
import { typedNumber, type FormValues, type PostedForm } from '#lib/http/forms';
import { idOf, valueOf } from '#lib/http/outcome';
import { badRequest } from '#lib/http/problem';
import { changeInstrument } from '#lib/services/instruments/change';
import { endStay, withdrawStay } from '#lib/services/instruments/changeStay';
import { deploy } from '#lib/services/instruments/deploy';
import { certificateFromForm, checkFromForm, decideFromForm, withdrawCheckFromForm } from './_checkActions';
import { typedSec } from './_typed';

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
export async function actOnInstrument(form: PostedForm, setting: Setting): Promise<void> {
  const { text } = form;
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
    case 'check':
      return checkFromForm(form, setting);
    case 'certificate':
      return certificateFromForm(form, { networkId, userId });
    case 'withdraw-check':
      return withdrawCheckFromForm(form, { networkId, userId });
    case 'decide':
      return decideFromForm(form, { networkId, userId });
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
