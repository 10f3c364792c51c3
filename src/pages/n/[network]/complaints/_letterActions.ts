import type { PostedForm } from '#lib/http/forms';
import { valueOf } from '#lib/http/outcome';
import { changeAnswering } from '#lib/services/complaints/templates/answering';
import { keepTemplate, withdrawTemplate } from '#lib/services/complaints/templates/templates';

/** Done: what the page's address says then. Typed: the text is only looked at, nothing was kept. */
export type LettersOutcome =
  { kind: 'done'; query: string } | { kind: 'typed'; typed: Readonly<Record<string, string>> };

/** Does what a form of the page of letters asks. @throws {Problem} with what is wrong, by field. */
export async function actOnLetters(
  form: PostedForm,
  who: { networkId: number; userId: string },
): Promise<LettersOutcome> {
  const { text } = form;
  switch (text['action']) {
    case 'keep': {
      const template = valueOf(
        await keepTemplate(who, {
          template: text['template'] ? Number(text['template']) : null,
          version: Number(text['version'] ?? 0),
          name: text['name'] ?? '',
          body: text['body'] ?? '',
        }),
      );
      return { kind: 'done', query: `template=${template}&saved` };
    }
    case 'withdraw':
    case 'bring-back': {
      const isWithdrawn = text['action'] === 'withdraw';
      valueOf(await withdrawTemplate(who, Number(text['template']), isWithdrawn));
      return { kind: 'done', query: 'saved' };
    }
    case 'settings': {
      const replyAddress = text['replyAddress'] || null;
      valueOf(await changeAnswering(who, { needsApproval: text['needsApproval'] === 'yes', replyAddress }));
      return { kind: 'done', query: 'saved' };
    }
    default:
      return { kind: 'typed', typed: text };
  }
}
