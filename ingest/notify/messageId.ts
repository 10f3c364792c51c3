export { messageIdOf } from '#lib/services/mails/messageId';
