import express, { type Express, type Response } from 'express';
import { listPage, messagePage } from './page';
import { BEHAVIOURS, type Behaviour } from './smtp';
import { addressText, attachmentsOf, type MailStore, type StoredMail } from './store';

export interface MailControl {
  behaviour: Behaviour;
}

/** The mailbox as pages, and as JSON for tests. */
export function mailboxApp(store: MailStore, control: MailControl): Express {
  const app = express();
  app.disable('x-powered-by');
  app.use((_request, response, next) => {
    response.set({
      'Content-Security-Policy':
        "default-src 'none'; style-src 'unsafe-inline'; frame-src 'self'; form-action 'self'",
      'X-Content-Type-Options': 'nosniff',
      'Cache-Control': 'no-store',
    });
    next();
  });

  app.get('/healthz', (_request, response) => void response.json({ status: 'ok' }));
  app.get('/', (request, response) => {
    const to = textOf(request.query['to']);
    response.send(listPage(store.list({ to }), to));
  });
  app.get('/messages/:id', (request, response) =>
    withMail(store, request.params.id, response, (mail) => response.send(messagePage(mail))),
  );
  app.get('/messages/:id/html', (request, response) =>
    withMail(store, request.params.id, response, ({ parsed }) => {
      response.set(
        'Content-Security-Policy',
        "default-src 'none'; style-src 'unsafe-inline'; img-src data:; sandbox",
      );
      response.send(parsed.html || '');
    }),
  );
  app.get('/messages/:id/attachments/:at', (request, response) =>
    withMail(store, request.params.id, response, (mail) => {
      const attachment = attachmentsOf(mail)[Number(request.params.at)];
      if (!attachment) return void response.sendStatus(404);
      response
        .attachment(attachment.filename ?? 'unnamed')
        .type('application/octet-stream')
        .send(attachment.content);
    }),
  );

  app.get('/api/messages', (request, response) => {
    const { to, subject } = request.query;
    response.json(store.list({ to: textOf(to), subject: textOf(subject) }).map(mailJson));
  });
  app.delete('/api/messages', (_request, response) => {
    store.clear();
    response.sendStatus(204);
  });
  app.post('/api/behaviour', express.json(), (request, response) => {
    const mode = BEHAVIOURS.find((known) => known === (request.body as { mode?: unknown })?.mode);
    if (!mode)
      return void response.status(422).json({ detail: `mode must be one of ${BEHAVIOURS.join(', ')}` });
    control.behaviour = mode;
    response.json({ mode });
  });
  return app;
}

function textOf(value: unknown): string {
  return typeof value === 'string' ? value : '';
}

function withMail(
  store: MailStore,
  id: string,
  response: Response,
  answer: (mail: StoredMail) => void,
): void {
  const mail = store.find(id);
  if (mail) answer(mail);
  else response.sendStatus(404);
}

function mailJson(mail: StoredMail) {
  const { parsed, id, recipients } = mail;
  return {
    id,
    messageId: parsed.messageId ?? null,
    from: addressText(parsed.from),
    to: recipients.join(', '),
    subject: parsed.subject ?? '',
    date: parsed.date?.toISOString() ?? null,
    text: parsed.text ?? '',
    html: parsed.html || '',
    attachments: attachmentsOf(mail).map(({ filename, size }) => ({ filename: filename ?? null, size })),
  };
}
