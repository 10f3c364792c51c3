import { log } from '#lib/config/log';
import { loggedPath } from './loggedPath';

/** What is worth looking at when it comes often: not signed in or wrongly, not allowed, too often. */
const REFUSALS = new Set([401, 403, 429]);

/** A request, as far as the log may tell of it. */
export interface NotedRequest {
  requestId: string;
  method: string;
  path: string;
  /** Of the signed-in person, who is not named. */
  userId: string | null;
}

/** Notes in the log that somebody was refused at a door, so that tries can be told from mistakes. */
export function noteRefusal(status: number, { path, ...request }: NotedRequest): void {
  if (REFUSALS.has(status)) log().info({ ...request, path: loggedPath(path), status }, 'refused');
}
