import { createServer } from 'node:http';
import { listen, stopOnSignal, urlOf } from '../listening';
import { mailboxApp, type MailControl } from './app';
import { smtpServer } from './smtp';
import { MailStore } from './store';

const HOST = '127.0.0.1';
const smtpPort = Number(process.env['BITTERN_MAIL_SMTP_PORT'] || 4325);
const webPort = Number(process.env['BITTERN_MAIL_WEB_PORT'] || 4326);

const store = new MailStore(process.env['BITTERN_MAIL_DIR'] || '.bittern/mail');
await store.load();
const control: MailControl = { behaviour: 'normal' };
const smtp = smtpServer(store, () => control.behaviour);
smtp.on('error', (error) => console.error(error.message));
const web = createServer(mailboxApp(store, control));
await listen(smtp.server, HOST, smtpPort, 'BITTERN_SMTP_PORT');
await listen(web, HOST, webPort, 'BITTERN_MAIL_WEB_PORT');
stopOnSignal([smtp, web]);
console.log(`Mailbox at ${urlOf(web)}, mail taken on port ${smtpPort}`);
