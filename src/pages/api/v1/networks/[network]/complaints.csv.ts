import { requireNetwork } from '#lib/auth/guards';
import { ALL_ROLES, mayAct } from '#lib/auth/roles';
import { readComplaintList } from '#lib/contracts/complaintList';
import { complaintFilterOf } from '#lib/http/complaintFilter';
import { badRequest } from '#lib/http/problem';
import { csv } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { complaintsCsv, MOST_CSV_COMPLAINTS } from '#lib/services/complaints/listCsv';
import { localDateAt } from '#lib/time/zone';

export const GET = route(async (context) => {
  const { user, roles, network, settings } = await requireNetwork(context, context.params.network, ALL_ROLES);
  const now = new Date();
  const today = localDateAt(Math.floor(now.getTime() / 1000), settings.timeZone);
  const filter = complaintFilterOf(
    readComplaintList(context.url, { isAnswerer: mayAct(user, roles, ['liaison']) }),
    {
      userId: user.id,
      today,
      zone: settings.timeZone,
    },
  );
  const text = await complaintsCsv(network, settings, filter, now);
  if (text === null) {
    throw badRequest(`The list has more than ${MOST_CSV_COMPLAINTS} complaints; ask for a shorter period.`);
  }
  return csv(text, `${network.slug}-complaints.csv`);
});
