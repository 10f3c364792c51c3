import { requireMastToken } from '#lib/auth/mastGuard';
import { weatherBatchSchema } from '#lib/contracts/weather';
import { HeldBytes } from '#lib/http/heldBytes';
import { inTime } from '#lib/http/inTime';
import { monitorRequestOf } from '#lib/http/monitorRequest';
import { Problem } from '#lib/http/problem';
import { readMonitorBody, bytesOfBody } from '#lib/http/readMonitorBody';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { receiveWeather } from '#lib/services/weather/receive';

export const POST = route(async (context) => {
  const request = monitorRequestOf(context.request);
  const mast = await inTime(requireMastToken(context.request));
  const held = new HeldBytes();
  try {
    const body = await readMonitorBody(request, held);
    const records = recordsOf((await bytesOfBody(body)).toString('utf8'));
    return json(await inTime(receiveWeather(mast, records, new Date())));
  } finally {
    held.release();
  }
});

function recordsOf(text: string): unknown[] {
  let posted: unknown;
  try {
    posted = JSON.parse(text);
  } catch {
    throw unreadable('The body is not JSON.');
  }
  const parsed = weatherBatchSchema.safeParse(posted);
  if (parsed.success) return parsed.data.records;
  const [issue] = parsed.error.issues;
  throw unreadable(`\`${String(issue?.path[0] ?? 'body')}\` ${issue?.message ?? 'is wrong'}.`);
}

function unreadable(detail: string): Problem {
  return new Problem(422, 'unreadable', 'No records could be read', detail);
}
