import type { IncomingMessage, RequestListener } from 'node:http';
import compression from 'compression';
import express, { type Express, type Request, type RequestHandler, type Response } from 'express';
import expressStaticGzip from 'express-static-gzip';
import helmet from 'helmet';
import type { Config } from '#lib/config/config';
import { peopleUnderWay } from '#lib/http/peopleUnderWay';
import { clientAddress, proxyTrust, type TrustsProxy } from './clientAddress';
import { contentSecurityPolicy } from './contentSecurity';
import { closeLingering } from './lingeringClose';
import { receivePost } from './receive';
import { securityText } from './securityText';

const MOST_BODY_BYTES = 16 * 1024 * 1024;
const DAY_SEC = 86_400;
const YEAR_SEC = 365 * DAY_SEC;

/** Where monitors post; what arrives there needs neither Express, the pages' server nor what protects browsers. */
const POSTS = /^\/api\/v1\/intervals\/?(\?|$)/i;
/** Where files of intervals are uploaded; they are streamed to disk. */
const UPLOADS = /^\/(api\/v1\/networks\/[^/]+\/imports|n\/[^/]+\/imports\/new)\/?$/;
const FORWARDING = ['forwarded', 'x-forwarded-host', 'x-forwarded-proto', 'x-forwarded-port', 'x-real-ip'];
/** What a form adds around a file. */
const FORM_BYTES = 64 * 1024;

/** What is left out is as if it were not set. */
type FrontSettings = Pick<Config, 'allowedHosts' | 'trustedProxies' | 'origin' | 'importMostBytes'> &
  Partial<Pick<Config, 'hstsDays' | 'mapOrigins' | 'securityContact'>>;

/** Astro's handler in middleware mode. */
export type AstroHandler = (request: Request, response: Response) => Promise<void> | void;

/** What a server listens by: posts of monitors go straight to receiving, everything else is a person's and passes the front before Astro. */
export function makeFront(astro: AstroHandler, settings: FrontSettings): RequestListener {
  const trusts = proxyTrust(settings.trustedProxies);
  const pages = makePagesFront(astro, settings, trusts);
  const isPost = ({ method, url, headers }: IncomingMessage) =>
    method === 'POST' && POSTS.test(url ?? '') && isKnownHost(settings.allowedHosts, headers.host);
  return (request, response) => {
    if (isPost(request)) {
      void receivePost(request, response, clientAddress(request, trusts));
      return;
    }
    peopleUnderWay.note(response);
    pages(request, response);
  };
}

/**
 * The thin HTTP front before Astro: Host allow-list, proxy trust, a bound on bodies, compression, static files.
 * Handlers count the bytes of what they read themselves; the bound here stops what announces itself as too large.
 */
function makePagesFront(astro: AstroHandler, settings: FrontSettings, trusts: TrustsProxy): Express {
  const front = express();
  front.disable('x-powered-by');
  front.use(safeHeaders(settings));
  front.use(requireKnownHost(settings.allowedHosts));
  front.use(requireKnownMethod);
  front.use(setClientAddress(trusts));
  front.use(refuseLargeBodies(settings.importMostBytes + FORM_BYTES));
  front.use(compression());
  front.use(tellSecurityContact(settings));
  front.use(
    '/_astro',
    // Packed once by the build: packing a map's scripts anew at every visit takes longer than sending them.
    expressStaticGzip('dist/client/_astro', {
      serveStatic: { immutable: true, maxAge: YEAR_SEC * 1000, fallthrough: false },
    }),
  );
  front.use(express.static('dist/client', { index: false, maxAge: 3_600_000 }));
  // Without a next handler Astro answers unknown paths itself, with its own page for them.
  front.use((request, response) => astro(request, response));
  return front;
}

/** What a page may load and who may show it, no address told to other sites; https kept once it is in use. */
function safeHeaders({ origin, mapOrigins = [], hstsDays = 365 }: FrontSettings): RequestHandler {
  const isKept = origin.startsWith('https:') && hstsDays > 0;
  return helmet({
    contentSecurityPolicy: { useDefaults: false, directives: contentSecurityPolicy(mapOrigins) },
    frameguard: { action: 'deny' },
    referrerPolicy: { policy: 'same-origin' },
    strictTransportSecurity: isKept ? { maxAge: hstsDays * DAY_SEC } : false,
  });
}

function tellSecurityContact({ securityContact, origin }: FrontSettings): RequestHandler {
  return (request, response, next) => {
    if (!securityContact || request.path !== '/.well-known/security.txt') return next();
    response.type('text/plain').send(securityText(securityContact, origin, new Date()));
  };
}

function requireKnownHost(allowedHosts: string[]): RequestHandler {
  return (request, response, next) => {
    if (isKnownHost(allowedHosts, request.headers.host)) return next();
    response
      .status(421)
      .type('text/plain')
      .send('This server does not answer under that name (BITTERN_ALLOWED_HOSTS).\n');
  };
}

const METHODS = ['GET', 'HEAD', 'POST', 'PUT', 'PATCH', 'DELETE', 'OPTIONS'];

/** TRACE, and what nobody uses, ends here: the pages' server cannot even represent it. */
const requireKnownMethod: RequestHandler = (request, response, next) => {
  if (METHODS.includes(request.method)) return next();
  response.status(405).set('Allow', METHODS.join(', ')).type('text/plain').send('There is no such method.\n');
};

function isKnownHost(allowedHosts: string[], host = ''): boolean {
  return allowedHosts.includes(host.toLowerCase());
}

/** Astro believes forwarding headers: it gets the one address that the proxy setting vouches for, and no others. */
function setClientAddress(trusts: TrustsProxy): RequestHandler {
  return (request: Request, _response, next) => {
    const address = clientAddress(request, trusts);
    for (const name of FORWARDING) delete request.headers[name];
    request.headers['x-forwarded-for'] = address;
    next();
  };
}

function refuseLargeBodies(mostUploadBytes: number): RequestHandler {
  return (request, response, next) => {
    const mostBytes = UPLOADS.test(request.path) ? mostUploadBytes : MOST_BODY_BYTES;
    if (Number(request.headers['content-length'] ?? 0) <= mostBytes) return next();
    closeLingering(request);
    response
      .status(413)
      .set('Connection', 'close')
      .type('application/problem+json')
      .send(JSON.stringify({ type: 'about:blank', status: 413, code: 'too-large', title: 'Too large' }));
  };
}
