import { type MastRow } from '#db/queries/masts';
import { mastChangeSchema, newAssignmentSchema, type WeatherFileReport } from '#lib/contracts/weather';
import { weatherSettlementSchema, type WeatherSettled } from '#lib/contracts/weatherQuarantine';
import { assignMast, endMastAssignment } from '#lib/services/weather/assign';
import { takeWeatherFile } from '#lib/services/weather/file';
import { addMastToken, changeMast, endMastToken } from '#lib/services/weather/masts';
import { settleWeather } from '#lib/services/weather/refused';
import { type PostedForm } from './forms';
import { idOf, valueOf } from './outcome';
import { badRequest, invalidFields, notFound } from './problem';

/** What came of a form of a mast's page. */
export type MastAct =
  | { kind: 'done'; word: 'changed' | 'assigned' | 'ended' | 'revoked' }
  | { kind: 'token'; token: string }
  | { kind: 'file'; report: WeatherFileReport }
  | { kind: 'settled'; outcome: WeatherSettled };

/** What the page read of a form that holds local times and typed numbers. */
interface Typed {
  facts: () => Record<string, unknown>;
  instant: (field: string) => string | undefined;
}

/**
 * Does what a form of a mast's page asks.
 * @throws {Problem} and zod errors, with what is wrong by field.
 */
export async function actOnMast(
  mast: MastRow,
  userId: string,
  form: PostedForm,
  typed: Typed,
): Promise<MastAct> {
  const actor = { networkId: mast.networkId, userId };
  const { text } = form;
  switch (text['act']) {
    case 'change': {
      const input = { ...typed.facts(), isRetired: text['isRetired'] === 'yes' };
      valueOf(await changeMast(mast.networkId, mast.code, mastChangeSchema.parse(input), userId));
      return { kind: 'done', word: 'changed' };
    }
    case 'assign': {
      const span = { from: typed.instant('from') ?? '', to: typed.instant('to') };
      const input = newAssignmentSchema.parse({ station: text['station'] ?? '', ...span });
      valueOf(await assignMast(actor, mast.code, input));
      return { kind: 'done', word: 'assigned' };
    }
    case 'end':
      valueOf(await endMastAssignment(actor, idOf(text['assignment']), Math.floor(Date.now() / 1000)));
      return { kind: 'done', word: 'ended' };
    case 'issue':
      return { kind: 'token', token: await addMastToken(mast, userId) };
    case 'revoke':
      if (await endMastToken(mast, idOf(text['token']), userId)) return { kind: 'done', word: 'revoked' };
      throw notFound('The mast has no such token in force; perhaps it was revoked meanwhile.');
    case 'try-file':
    case 'file': {
      const file = form.file('file');
      if (!file) throw invalidFields([{ field: 'file', message: 'must be chosen' }]);
      const isTrial = text['act'] === 'try-file';
      return { kind: 'file', report: valueOf(await takeWeatherFile(mast, await file.text(), isTrial)) };
    }
    case 'refused': {
      const ids = text['record'] ? [idOf(text['record'])] : undefined;
      if (!ids && text['state'] === 'superseded')
        throw invalidFields([{ field: 'ids', message: 'must name a record' }]);
      const settling = weatherSettlementSchema.parse({
        act: text['settle'],
        ids,
        reason: text['reason'] || null,
      });
      return { kind: 'settled', outcome: await settleWeather(mast, settling, userId, new Date()) };
    }
    default:
      throw badRequest('The form did not say what to do. Nothing was changed.');
  }
}
