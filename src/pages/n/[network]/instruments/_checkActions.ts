import {
  calibrationWithdrawalSchema,
  doubtDecisionSchema,
  MOST_CERTIFICATE_BYTES,
  newCalibrationSchema,
} from '#lib/contracts/calibrations';
import { formatInstantUtc } from '#lib/contracts/common';
import { typedNumber, type FormValues, type PostedForm } from '#lib/http/forms';
import { idOf, valueOf } from '#lib/http/outcome';
import { invalidFields } from '#lib/http/problem';
import { addCalibration } from '#lib/services/calibrations/add';
import { certificateTypeOf, storeCertificate } from '#lib/services/calibrations/certificate';
import { addCertificate, withdrawCheck, WRONG_TYPE } from '#lib/services/calibrations/change';
import { decideDoubt } from '#lib/services/calibrations/decide';
import { typedSec } from './_typed';

interface Setting {
  networkId: number;
  userId: string;
}

/** Notes the check that a form describes, with its certificate. @throws {Problem} and zod errors, by field. */
export async function checkFromForm(
  form: PostedForm,
  { networkId, userId, instrumentId, zone }: Setting & { instrumentId: number; zone: string },
): Promise<void> {
  const { text } = form;
  const input = newCalibrationSchema.parse({
    ...text,
    instrument: instrumentId,
    checkedAt: formatInstantUtc(typedSec(text['checkedAt'], zone, 'checkedAt')),
    calibratorLevel: typedNumber(text['calibratorLevel']),
    before: typedNumber(text['before']),
    after: typedNumber(text['after']) ?? null,
    checkedBy: text['checkedBy'] ?? '',
  });
  const bytes = await bytesOf(form);
  const type = bytes && certificateTypeOf(bytes);
  if (bytes && !type) throw invalidFields([{ field: 'certificate', message: WRONG_TYPE }]);
  const certificate = bytes && type ? await storeCertificate(bytes, type) : null;
  const act = { networkId, userId, nowSec: Math.floor(Date.now() / 1000) };
  valueOf(await addCalibration(act, input, certificate));
}

/** Keeps the certificate that a form brings for a check. @throws {Problem} by field. */
export async function certificateFromForm(form: PostedForm, setting: Setting): Promise<void> {
  const bytes = await bytesOf(form);
  if (!bytes) throw invalidFields([{ field: 'certificate', message: 'choose a file' }]);
  valueOf(await addCertificate({ ...setting, id: idOf(form.text['check']) }, bytes));
}

/** Withdraws a check. @throws {Problem} and zod errors, by field. */
export async function withdrawCheckFromForm({ text }: FormValues, setting: Setting): Promise<void> {
  const { reason } = calibrationWithdrawalSchema.parse({ reason: text['reason'] ?? '' });
  valueOf(await withdrawCheck({ ...setting, id: idOf(text['check']) }, reason));
}

/** Keeps or excludes the doubtful stretch that a form names. @throws {Problem} and zod errors, by field. */
export async function decideFromForm({ text }: FormValues, setting: Setting): Promise<void> {
  const [calibration, station, from] = (text['doubt'] ?? '').split('/');
  const { decision, reason = '' } = text;
  const asked = {
    calibration: idOf(calibration),
    station: station ?? '',
    from: from ?? '',
    decision,
    reason,
  };
  valueOf(await decideDoubt(setting, doubtDecisionSchema.parse(asked)));
}

async function bytesOf(form: PostedForm): Promise<Uint8Array | null> {
  const file = form.file('certificate');
  if (!file) return null;
  if (file.size > MOST_CERTIFICATE_BYTES) {
    throw invalidFields([{ field: 'certificate', message: 'may have at most 10 MiB' }]);
  }
  return new Uint8Array(await file.arrayBuffer());
}
