import { MOST_MARK_BYTES, summarySettingsSchema, type SummarySettings } from '#lib/contracts/summarySettings';
import { typedNumber, type PostedForm } from '#lib/http/forms';
import { invalidFields } from '#lib/http/problem';
import { type MarkChange, type SummarySettingsNow } from '#lib/services/summaries/template/settings';

export const SETTINGS_LABELS = {
  graceDays: 'Days of grace',
  networkName: 'Name on the title page',
  introduction: 'Introduction',
  closing: 'Before the sign-off',
  sections: 'Sections',
  metrics: 'Levels',
  language: 'Language',
  mark: 'Mark',
};

/** What the form holds, as it was typed or as it is set. */
export interface TypedSettings {
  text: Readonly<Record<string, string>>;
  sections: readonly string[];
  metrics: readonly string[];
}

export function typedOf({ graceDays, template }: SummarySettingsNow): TypedSettings {
  return {
    text: {
      graceDays: String(graceDays),
      networkName: template.networkName ?? '',
      introduction: template.introduction,
      closing: template.closing,
      language: template.language,
    },
    sections: template.sections,
    metrics: template.metrics,
  };
}

/** The settings in a posted form. @throws {Problem} 422, and zod errors, with what is wrong by field. */
export function settingsFromForm(values: PostedForm): SummarySettings {
  const { text } = values;
  const parsed = summarySettingsSchema.safeParse({
    graceDays: typedNumber(text['graceDays']),
    template: {
      networkName: text['networkName'] === '' ? null : text['networkName'],
      introduction: text['introduction'] ?? '',
      closing: text['closing'] ?? '',
      sections: values.all('sections'),
      metrics: values.all('metrics'),
      language: text['language'],
    },
  });
  if (parsed.success) return parsed.data;
  throw invalidFields(
    parsed.error.issues.map(({ path, message }) => ({
      field: String(path[0] === 'template' ? (path[1] ?? '') : (path[0] ?? '')),
      message,
    })),
  );
}

/** What the form asks of the mark. @throws {Problem} 422 for a file that is too large. */
export async function markFromForm({ text, file }: PostedForm): Promise<MarkChange> {
  const chosen = file('mark');
  if (!chosen) return text['noMark'] === 'yes' ? null : 'keep';
  if (chosen.size > MOST_MARK_BYTES) {
    throw invalidFields([{ field: 'mark', message: `must have at most ${MOST_MARK_BYTES / 1024} KiB` }]);
  }
  return new Uint8Array(await chosen.arrayBuffer());
}
