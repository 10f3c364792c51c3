import { sendDueMail } from '#ingest/notify/sendOutbox';
import { makeTransport } from '#ingest/notify/transport';
import { config } from '#lib/config/index';
import { resolveComplaintReply } from '#lib/services/complaints/replyMessage';
import { resolveInvitationMail, resolveResetMail } from '#lib/services/people/linkMails';

const holder = `${process.pid}-${Date.now().toString(36)}`;
let transport: ReturnType<typeof makeTransport> | undefined;

/** Hands due e-mails to the mail server. @returns how many. */
export async function sendMail(now: Date): Promise<number> {
  transport ??= makeTransport(config());
  return sendDueMail(
    {
      transport,
      from: config().smtp.from,
      holder,
      resolvers: {
        'complaint-reply': ({ complaintReplyId }) => resolveComplaintReply(complaintReplyId ?? 0),
        invitation: (mail) => resolveInvitationMail(mail),
        'password-reset': (mail) => resolveResetMail(mail),
      },
    },
    now,
  );
}
