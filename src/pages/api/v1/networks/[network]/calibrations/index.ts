import { requireNetwork } from '#lib/auth/guards';
import { ALL_ROLES } from '#lib/auth/roles';
import { newCalibrationSchema } from '#lib/contracts/calibrations';
import { idOf, valueOf } from '#lib/http/outcome';
import { readJson } from '#lib/http/parse';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { addCalibration } from '#lib/services/calibrations/add';
import { dueChecks } from '#lib/services/calibrations/due';
import { calibrationsOf } from '#lib/services/calibrations/list';

const nowSec = () => Math.floor(Date.now() / 1000);

export const GET = route(async (context) => {
  const { network, settings } = await requireNetwork(context, context.params.network, ALL_ROLES);
  const instrument = context.url.searchParams.get('instrument');
  const [items, due] = await Promise.all([
    calibrationsOf(network.id, instrument === null ? null : idOf(instrument)),
    dueChecks(network.id, settings.timeZone, nowSec()),
  ]);
  return json({ items, due, next: null });
});

export const POST = route(async (context) => {
  const { network, user } = await requireNetwork(context, context.params.network, ['operator']);
  const input = await readJson(context.request, newCalibrationSchema);
  const act = { networkId: network.id, userId: user.id, nowSec: nowSec() };
  return json({ calibration: valueOf(await addCalibration(act, input)) }, { status: 201 });
});
