import { requireNetwork, requireStation } from '#lib/auth/guards';
import { ALL_ROLES } from '#lib/auth/roles';
import { formatInstantUtc } from '#lib/contracts/common';
import type { UsualLevels } from '#lib/contracts/usual';
import { parsePeriod } from '#lib/http/parse';
import { badRequest } from '#lib/http/problem';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { usualFor } from '#lib/services/levels/usual';

/** A longer window has no clock window of one day to compare with. A day of the autumn clock change has 25 hours. */
const LONGEST_SEC = 25 * 3600;

export const GET = route(async (context) => {
  const { network } = await requireNetwork(context, context.params.network, ALL_ROLES);
  const station = await requireStation(network.id, context.params.code);
  const window = parsePeriod(context.url);
  if (window.toSec - window.fromSec > LONGEST_SEC) throw badRequest('The window may be a day at most.');
  const usual = await usualFor({ station, window });
  const answer: UsualLevels = {
    from: formatInstantUtc(window.fromSec),
    to: formatInstantUtc(window.toSec),
    weeks: usual.weeks,
    validWeeks: usual.validWeeks,
    LAeq: { median: usual.medianDb, low: usual.lowDb, high: usual.highDb },
    bands: usual.bands.map(({ nominalHz, medianDb }) => ({ nominalHz, median: medianDb })),
    octaves: usual.octaves.map(({ nominalHz, medianDb }) => ({ nominalHz, median: medianDb })),
  };
  return json(answer);
});
