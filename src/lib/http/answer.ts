/** An answer before it is a web Response, which costs more than all else that receiving does for a small post. */
export interface Answer {
  status: number;
  headers: Record<string, string>;
  body: string;
}

/** The answer as a web Response. */
export function responseOf({ status, headers, body }: Answer): Response {
  return new Response(body, { status, headers });
}
