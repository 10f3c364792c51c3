import type { AstroGlobal } from 'astro';
import { Problem } from '#lib/http/problem';
import { SealedError } from '#lib/services/retention/seal';
import { FACTOR_FIRST } from './factorWanted';
import { requireAdministrator, requireSession, requireSessionForPassword } from './guards';
import { enterNetwork, type NetworkAccess } from './networkAccess';
import { ALL_ROLES, type Role } from './roles';
import type { SignedInUser } from './sessions';

/**
 * For a page's frontmatter: the person, or the response to return instead (to sign in, or to change a password that was handed over,
 * and back here afterwards).
 */
export function pageUser(astro: AstroGlobal): SignedInUser | Response {
  const { user } = astro.locals;
  const next = encodeURIComponent(astro.url.pathname + astro.url.search);
  if (!user) return astro.redirect(`/sign-in?next=${next}`);
  return user.mustChangePassword ? astro.redirect(`/account/new-password?next=${next}`, 303) : user;
}

/** For the page that changes a password that was handed over: who has one, or the response to return instead. */
export async function pageHandedOver(
  astro: AstroGlobal,
): Promise<{ user: SignedInUser; sessionId: string } | Response> {
  if (!astro.locals.user) return astro.redirect('/sign-in');
  if (!astro.locals.user.mustChangePassword) return astro.redirect('/account', 303);
  return orRefusal(astro, async () => requireSessionForPassword(astro));
}

/** For a page's frontmatter: the person signed in in a browser, or the response to return instead. */
export async function pageSession(
  astro: AstroGlobal,
): Promise<{ user: SignedInUser; sessionId: string } | Response> {
  const user = pageUser(astro);
  if (user instanceof Response) return user;
  return orRefusal(astro, async () => requireSession(astro));
}

/** For a page's frontmatter: the administrator signed in in a browser; for anybody else the page is not there. */
export async function pageAdministrator(astro: AstroGlobal): Promise<SignedInUser | Response> {
  const session = await pageSession(astro);
  if (session instanceof Response) return session;
  if (!session.user.isAdministrator) return astro.rewrite('/404');
  return orRefusal(astro, async () => requireAdministrator(astro));
}

/** For a page's frontmatter: the person inside a network, or the response to return instead. */
export async function pageNetwork(
  astro: AstroGlobal,
  roles: readonly Role[] = ALL_ROLES,
): Promise<NetworkAccess | Response> {
  const user = pageUser(astro);
  if (user instanceof Response) return user;
  return orRefusal(astro, () => enterNetwork(user, astro.params['network'] ?? '', roles));
}

/** Runs a step of a page; a refusal becomes the page that tells it, or the one that puts it right. */
export async function orRefusal<T>(astro: AstroGlobal, step: () => Promise<T>): Promise<T | Response> {
  try {
    return await step();
  } catch (error) {
    if (error instanceof SealedError) {
      return astro.rewrite(`/refused?status=409&detail=${encodeURIComponent(error.message)}`);
    }
    if (!(error instanceof Problem)) throw error;
    if (error.status === 404) return astro.rewrite('/404');
    if (error.code === FACTOR_FIRST) {
      return astro.redirect(`/account/second-factor?next=${encodeURIComponent(astro.url.pathname)}`, 303);
    }
    return astro.rewrite(
      `/refused?status=${error.status}&detail=${encodeURIComponent(error.detail ?? error.title)}`,
    );
  }
}
