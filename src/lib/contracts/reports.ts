import { z } from 'zod';
import { registerRoute } from './registry';

/** Languages of the residents' form. */
export const REPORT_LANGUAGES = ['en', 'de'] as const;
export type ReportLanguage = (typeof REPORT_LANGUAGES)[number];

/** Chosen where the noise was heard in none of the network's areas. */
export const ELSEWHERE = 'elsewhere';

/** How a resident says when: a choice that becomes a window, or its two ends. */
export const REPORT_WHENS = ['now', 'about', 'exact'] as const;
export type ReportWhen = (typeof REPORT_WHENS)[number];

/** How long what goes on now has gone on, minutes. */
export const NOW_MINUTES = [15, 30, 60, 120, 240, 480] as const;

/** Fields of the form as typed, so that nothing is lost on an error. */
export const REPORT_FIELDS = [
  'when',
  'lasting',
  'day',
  'clock',
  'from',
  'to',
  'kind',
  'words',
  'area',
  'place',
  'name',
  'email',
  'phone',
  'address',
  'consent',
] as const;
export type ReportField = (typeof REPORT_FIELDS)[number];
export type TypedReport = Record<ReportField, string> & { effects: string[] };

/** What can be wrong with a report; each language has words for every one. */
export type ReportFault =
  | 'choose'
  | 'unreadable-clock'
  | 'unreadable-time'
  | 'ends-before'
  | 'too-long-window'
  | 'future'
  | 'too-long-ago'
  | 'too-long-text'
  | 'unreadable-place'
  | 'where-at-all'
  | 'unreadable-email'
  | 'consent'
  | 'file-type'
  | 'file-size'
  | 'station-away'
  | 'write-something'
  | 'hidden-field'
  | 'too-fast'
  | 'form-expired'
  | 'too-many'
  | 'busy'
  | 'closed'
  | 'confirm-erase';

/** Field → what is wrong; the empty name is the whole form, `file` the attachment. */
export type ReportFaults = Partial<Record<ReportField | 'file' | 'addition' | 'erase' | '', ReportFault>>;

/** Most bytes of the one file that a report may carry. */
export const MOST_ATTACHMENT_BYTES = 5 * 1024 * 1024;
export const MOST_WORDS_CHARACTERS = 4000;
export const MOST_ADDITION_CHARACTERS = 2000;

export const ATTACHMENT_TYPES = [
  'image/jpeg',
  'image/png',
  'audio/mpeg',
  'audio/mp4',
  'audio/ogg',
  'audio/wav',
] as const;
export type AttachmentType = (typeof ATTACHMENT_TYPES)[number];

const MOST_AREAS = 60;
const AREA = /^(.{1,80}?)\s*=\s*(\S{1,32})$/;

/** An area that residents may choose, with the code of the station that speaks for it. */
export interface ReportArea {
  name: string;
  station: string;
}

/** The residents' form as the liaison sets it up; areas are lines such as `Harbour quarter = MER-04`. */
export const reportFormSchema = z.object({
  isOpen: z.boolean(),
  keeper: z
    .string()
    .trim()
    .min(1, 'must name who keeps the reports and how to reach them')
    .max(300, 'must have at most 300 characters'),
  areas: z.string().transform((text, context) => {
    const lines = text
      .split('\n')
      .map((line) => line.trim())
      .filter((line) => line !== '');
    const areas = lines.map((line): ReportArea => {
      const [, name = '', station = ''] = AREA.exec(line) ?? [];
      return { name: name.trim(), station };
    });
    const wrong = lines.find((_, at) => !areas[at]?.name || areas[at].name === ELSEWHERE);
    if (wrong !== undefined) {
      context.addIssue({
        code: 'custom',
        message: `“${wrong.slice(0, 40)}” must be a name, an equals sign and a station’s code`,
      });
    }
    if (areas.length > MOST_AREAS) {
      context.addIssue({ code: 'custom', message: `must be at most ${MOST_AREAS} areas` });
    }
    if (new Set(areas.map(({ name }) => name.toLowerCase())).size < areas.length) {
      context.addIssue({ code: 'custom', message: 'must not name an area twice' });
    }
    return areas;
  }),
});
export type ReportFormInput = z.output<typeof reportFormSchema>;

registerRoute({
  access: 'person',
  method: 'get',
  path: '/api/v1/networks/{network}/complaints/{reference}/attachment',
  summary: 'The file that a resident sent with a report (liaison); always to be saved, never shown',
  request: { params: z.object({ network: z.string(), reference: z.string() }) },
  responses: { 200: { description: 'The file', content: { 'application/octet-stream': {} } } },
});
