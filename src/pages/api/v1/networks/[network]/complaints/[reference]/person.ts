import { requireNetwork } from '#lib/auth/guards';
import { EXPORT_FORMATS } from '#lib/contracts/personalExport';
import { parseChoice } from '#lib/http/parse';
import { notFound } from '#lib/http/problem';
import { download } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { exportPerson } from '#lib/services/complaints/desk/exportPerson';
import { exportText } from '#lib/services/complaints/desk/exportText';

export const GET = route(async (context) => {
  const { network, user } = await requireNetwork(context, context.params.network, ['liaison']);
  const reference = context.params.reference ?? '';
  const format = parseChoice(context.url, 'format', EXPORT_FORMATS);
  const held = await exportPerson(user.id, network, reference, new Date());
  if (held === 'unknown') throw notFound('The network has no complaint with this reference.');
  if (held === 'erased') throw notFound('The personal data have been erased: nothing is held any more.');
  // The file's name says which report it is about, never whom.
  const answer =
    format === 'json'
      ? download(JSON.stringify(held, null, 2), 'application/json; charset=utf-8', `${reference}-data.json`)
      : download(exportText(held), 'text/plain; charset=utf-8', `${reference}-data.txt`);
  answer.headers.set('Cache-Control', 'private, no-store');
  return answer;
});
