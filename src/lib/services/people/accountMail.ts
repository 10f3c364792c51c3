import { randomUUID } from 'node:crypto';
import { type Connection } from '#db/queries/connection';
import { insertMail } from '#db/queries/outbox';
import { config } from '#lib/config/index';
import { formatInstant } from '#lib/format/times';
import { messageIdOf } from '../mails/messageId';
import { noteHtml, noteText, type Note } from '../mails/note';

/** What a person is told about the own account, so that what somebody else did is noticed. */
export type AccountNews =
  | { kind: 'sign-in'; browser: string | null; address: string; isNewAddress: boolean }
  | { kind: 'password'; how: 'self' | 'link' | 'administrator' }
  | { kind: 'second-factor-on' }
  | { kind: 'second-factor-off'; by: 'self' | 'administrator' }
  | { kind: 'recovery-codes' }
  | { kind: 'recovery-code-used'; left: number };

const CLOSING =
  'If this was not you: change your password, end the sessions that you do not know, and tell your administrator.';

/** Puts a message about a person's account into the outbox, in the transaction of what it tells. */
export async function tellPerson(
  email: string,
  news: AccountNews,
  at: Date,
  transaction: Connection,
): Promise<void> {
  const dedupeKey = `account:${randomUUID()}`;
  const note = noteOf(news, at);
  await insertMail(
    {
      messageId: messageIdOf(dedupeKey),
      dedupeKey,
      networkId: null,
      kind: 'account',
      recipient: email,
      subject: note.subject,
      text: noteText(note),
      html: noteHtml(note),
    },
    transaction,
  );
}

/** Puts a message into the outbox whose link is made only when it is sent: no copy of the database can follow it. */
export async function putLinkMail(
  kind: 'invitation' | 'password-reset',
  email: string,
  transaction: Connection,
): Promise<void> {
  const dedupeKey = `${kind}:${randomUUID()}`;
  const mail = { messageId: messageIdOf(dedupeKey), dedupeKey, networkId: null, kind, recipient: email };
  const subject = kind === 'invitation' ? 'Your invitation to Bittern' : 'A new password for Bittern';
  await insertMail({ ...mail, subject, text: null, html: null }, transaction);
}

function noteOf(news: AccountNews, at: Date): Note {
  const [subject, opening] = wordsOf(news);
  const when: [string, string] = ['When', `${formatInstant(Math.floor(at.getTime() / 1000), 'UTC')} UTC`];
  return {
    subject,
    opening,
    facts: news.kind === 'sign-in' ? [when, ...originFacts(news)] : [when],
    link: { label: 'Your account', url: `${config().origin}/account` },
    closing: CLOSING,
  };
}

function originFacts(news: Extract<AccountNews, { kind: 'sign-in' }>): [string, string][] {
  return [
    ['Browser', news.browser ?? 'not told'],
    ['From', news.address],
  ];
}

function wordsOf(news: AccountNews): [subject: string, opening: string] {
  switch (news.kind) {
    case 'sign-in':
      return news.isNewAddress
        ? [
            'Sign-in from a new address',
            'Your account was signed in to from a network address not seen before.',
          ]
        : ['Sign-in from a new device', 'Your account was signed in to from a device not seen before.'];
    case 'password':
      return ['Your password was changed', PASSWORD_WORDS[news.how]];
    case 'second-factor-on':
      return [
        'Second factor set up',
        'From now on signing in asks for a code of your authenticator as well.',
      ];
    case 'second-factor-off':
      return [
        'Second factor taken away',
        news.by === 'self'
          ? 'Signing in asks for your password alone from now on.'
          : 'An administrator took your second factor away. Signing in asks for your password alone until you set up a new one.',
      ];
    case 'recovery-codes':
      return ['New recovery codes', 'New recovery codes were made; the earlier ones open nothing any more.'];
    case 'recovery-code-used':
      return [
        'A recovery code was used',
        `One of your recovery codes was used to sign in. ${news.left === 1 ? '1 is' : `${news.left} are`} left.`,
      ];
  }
}

const PASSWORD_WORDS = {
  self: 'The password of your account was changed. Sessions elsewhere have ended.',
  link: 'The password of your account was changed by a link from an e-mail. Every session has ended; access tokens stay in force.',
  administrator: 'An administrator gave your account a new password. Every session has ended.',
} as const;
