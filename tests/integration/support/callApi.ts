import type { APIContext, APIRoute } from 'astro';
import { actingFrom } from '#lib/auth/actingFrom';
import { userOfRequest } from '#lib/auth/requestUser';
import { problemResponse } from '#lib/http/problem';
import { problemOf } from '#lib/http/route';
import { requireSameOrigin } from '#lib/http/sameOrigin';

type RouteModule = Partial<Record<'GET' | 'POST' | 'PATCH' | 'PUT' | 'DELETE' | 'ALL', APIRoute>>;

const modules = import.meta.glob<RouteModule>('../../../src/pages/**/*.ts');

interface Call {
  /** Bearer token: a station's or a person's. */
  token?: string;
  /** Session id, as in the session cookie. */
  session?: string;
  body?: unknown;
  headers?: Record<string, string>;
  clientAddress?: string;
  /** Cookies that a browser keeps between calls: read, and written to. */
  jar?: Map<string, string>;
}

/**
 * Calls the handler that the file-based routes give for a path, as the server would: own-origin check, who is asking,
 * handler. A plain object as body goes as JSON; a string, Buffer or stream goes as it is.
 */
export async function callApi(method: string, path: string, call: Call = {}): Promise<Response> {
  const url = new URL(path, 'http://127.0.0.1:4321');
  const found = await findHandler(method, url.pathname);
  if (!found) return new Response(null, { status: 404 });
  const request = requestOf(method, url, call);
  const context = contextOf(request, url, found.params, call);
  try {
    requireSameOrigin(request);
    context.locals.user = await userOfRequest(context);
  } catch (error) {
    return problemResponse(problemOf(error, url.pathname));
  }
  return actingFrom(context.clientAddress, async () => found.handler(context));
}

/** Every route file’s pattern, such as `/api/v1/networks/[network]/stations`. */
export function routePatterns(): string[] {
  return Object.keys(modules).map(patternOf);
}

/** Methods that a route file answers. */
export async function methodsOf(pattern: string): Promise<string[]> {
  const file = Object.keys(modules).find((name) => patternOf(name) === pattern);
  const handlers = file && modules[file] ? await modules[file]() : {};
  return Object.keys(handlers).filter((name) => /^[A-Z]+$/.test(name));
}

async function findHandler(method: string, pathname: string) {
  const candidates = Object.keys(modules)
    .map((file) => ({ file, params: matchPattern(patternOf(file), pathname) }))
    .filter((candidate) => candidate.params !== null)
    .sort((a, b) => Object.keys(a.params ?? {}).length - Object.keys(b.params ?? {}).length);
  const [best] = candidates;
  const load = best && modules[best.file];
  if (!best?.params || !load) return null;
  const handlers = await load();
  const handler = handlers[method as keyof RouteModule] ?? handlers.ALL;
  return handler ? { handler, params: best.params } : null;
}

function patternOf(file: string): string {
  return file
    .replace(/^.*\/src\/pages/, '')
    .replace(/\.ts$/, '')
    .replace(/\/index$/, '');
}

function matchPattern(pattern: string, pathname: string): Record<string, string> | null {
  const names: string[] = [];
  const source = pattern
    .replace(/[.+?^${}()|\\]/g, '\\$&')
    .replace(/\[(?:\\\.\\\.\\\.)?(\w+)\]/g, (_, name: string) => (names.push(name), '([^/]+?)'));
  const matched = new RegExp(`^${source}$`).exec(pathname);
  if (!matched) return null;
  return Object.fromEntries(names.map((name, at) => [name, decodeURIComponent(matched[at + 1] ?? '')]));
}

function requestOf(method: string, url: URL, call: Call): Request {
  const headers = new Headers(call.headers);
  if (call.token) headers.set('authorization', `Bearer ${call.token}`);
  if (call.session) headers.set('cookie', `bittern-session=${call.session}`);
  const isPlain =
    call.body !== undefined && typeof call.body === 'object' && call.body?.constructor === Object;
  if (isPlain && !headers.has('content-type')) headers.set('content-type', 'application/json');
  const body = isPlain ? JSON.stringify(call.body) : (call.body as BodyInit | undefined);
  return new Request(url, { method, headers, body, duplex: 'half' } as RequestInit);
}

function contextOf(request: Request, url: URL, params: Record<string, string>, call: Call): APIContext {
  const cookies = call.jar ?? new Map<string, string>();
  if (call.session) cookies.set('bittern-session', call.session);
  const context = {
    request,
    url,
    params,
    locals: { user: null, requestId: 'test' },
    clientAddress: call.clientAddress ?? '127.0.0.1',
    cookies: {
      get: (name: string) => {
        const value = cookies.get(name);
        return value === undefined ? undefined : { value };
      },
      set: (name: string, value: string) => cookies.set(name, value),
      delete: (name: string) => cookies.delete(name),
    },
    redirect: (location: string, status = 302) => new Response(null, { status, headers: { location } }),
  };
  return context as unknown as APIContext;
}
