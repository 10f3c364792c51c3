import { requireNetwork } from '#lib/auth/guards';
import { ALL_ROLES } from '#lib/auth/roles';
import { calibrationSettingsSchema } from '#lib/contracts/calibrations';
import { readJson } from '#lib/http/parse';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { calibrationSettings, changeCalibrationSettings } from '#lib/services/calibrations/settings';

export const GET = route(async (context) => {
  const { network } = await requireNetwork(context, context.params.network, ALL_ROLES);
  return json({ settings: await calibrationSettings(network.id) });
});

export const PUT = route(async (context) => {
  const { network, user } = await requireNetwork(context, context.params.network, ['operator']);
  const settings = await readJson(context.request, calibrationSettingsSchema);
  return json({ settings: await changeCalibrationSettings(network.id, settings, user.id) });
});
