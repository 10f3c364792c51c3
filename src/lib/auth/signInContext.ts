import type { APIContext } from 'astro';
import { type SignInOrigin } from '#lib/services/people/signIns';
import { deviceOf } from './device';
import { type SessionCookie } from './sessions';

/** Where a request comes from, for signing in. */
export function originOf(context: Pick<APIContext, 'clientAddress' | 'request' | 'cookies'>): SignInOrigin {
  return {
    address: context.clientAddress,
    agent: context.request.headers.get('user-agent'),
    device: deviceOf(context.cookies),
  };
}

/** Sets cookies on the answer. */
export function setCookies(context: Pick<APIContext, 'cookies'>, cookies: readonly SessionCookie[]): void {
  for (const { name, value, attributes } of cookies) context.cookies.set(name, value, attributes);
}
