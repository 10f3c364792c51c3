import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';

/** The process answers; nothing else is looked at. */
export const GET = route(() => json({ status: 'ok' }));
