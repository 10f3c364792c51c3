import { createTransport, type Transporter } from 'nodemailer';
import type { Config } from '#lib/config/config';

/** The mail server of the settings. A message can name no file and no address to fetch. */
export function makeTransport({ smtp }: Pick<Config, 'smtp'>): Transporter {
  return createTransport({
    host: smtp.host,
    port: smtp.port,
    secure: smtp.isSecure,
    ...(smtp.user === null ? {} : { auth: { user: smtp.user, pass: smtp.password ?? '' } }),
    connectionTimeout: 10_000,
    greetingTimeout: 10_000,
    socketTimeout: 30_000,
    disableFileAccess: true,
    disableUrlAccess: true,
  });
}
