import { responseOf, type Answer } from './answer';

interface Options {
  status?: number;
  headers?: Record<string, string>;
}

/** A JSON answer; private to the caller, never cached by a proxy. */
export function json(body: unknown, options: Options = {}): Response {
  return responseOf(jsonAnswer(body, options));
}

/** The same before it is a web Response. */
export function jsonAnswer(body: unknown, { status = 200, headers = {} }: Options = {}): Answer {
  return {
    status,
    headers: { 'Content-Type': 'application/json; charset=utf-8', 'Cache-Control': 'no-store', ...headers },
    body: JSON.stringify(body),
  };
}

/** An answer without a body. */
export function noContent(headers: Record<string, string> = {}): Response {
  return new Response(null, { status: 204, headers: { 'Cache-Control': 'no-store', ...headers } });
}

/** A file to download. `fileName` holds letters, digits, dot, hyphen and underscore only. */
export function download(
  body: BodyInit,
  contentType: string,
  fileName: string,
  headers: Record<string, string> = {},
): Response {
  return new Response(body, {
    headers: {
      ...headers,
      'Content-Type': contentType,
      'Content-Disposition': `attachment; filename="${fileName.replace(/[^\w.-]/g, '_')}"`,
      'Cache-Control': 'no-store',
    },
  });
}

/** A PDF to read in the browser and to print, never kept in a cache: it may name a person. */
export function pdfToRead(bytes: Uint8Array, fileName: string): Response {
  return new Response(new Uint8Array(bytes), {
    headers: {
      'Content-Type': 'application/pdf',
      'Content-Disposition': `inline; filename="${fileName.replace(/[^\w.-]/g, '_')}"`,
      'Cache-Control': 'private, no-store',
      'X-Content-Type-Options': 'nosniff',
    },
  });
}

/** CSV text (RFC 4180, UTF-8) to download. */
export function csv(text: string, fileName: string, headers: Record<string, string> = {}): Response {
  return download(text, 'text/csv; charset=utf-8; header=present', fileName, headers);
}
