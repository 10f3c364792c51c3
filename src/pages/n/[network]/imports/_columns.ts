import { readMapping, typedMapping, typedOf, type TypedMapping } from '#components/imports/mappingForm.ts';
import { mapColumns } from '#ingest/imports/map';
import { importHead } from '#ingest/imports/open';
import { type Import } from '#lib/contracts/imports';
import { type FormValues } from '#lib/http/forms';
import { importFrom } from '#lib/http/importOutcome';
import { actOnImport } from '#lib/services/imports/act';
import { importActSchema } from '#lib/contracts/imports';

interface Asked {
  networkId: number;
  id: number;
  userId: string;
}

const DELIMITERS = { ',': ',', ';': ';', tab: '\t' } as const;
const MOST_COLUMNS = 200;

/** Does what a form of an import's page asks. @throws {Problem} with what can be put right. */
export async function actOnImportPage(values: FormValues, asked: Asked): Promise<Import> {
  if (values.text['action'] === 'map') {
    return importFrom(await mapColumns(asked, readMapping(typedMapping(values.text, columnCount(values)))));
  }
  const { act, reason = null } = importActSchema.parse({
    act: values.text['action'],
    reason: values.text['reason'] || null,
  });
  return importFrom(await actOnImport({ ...asked, act, reason }));
}

/** What the form about the columns shows: what was typed, else what was said before, else a guess. */
export async function columnsForm(
  one: Import,
  { networkId, zone, url }: { networkId: number; zone: string; url: URL },
  posted: FormValues | null,
) {
  const asked = url.searchParams;
  const delimiter = DELIMITERS[(asked.get('delimiter') ?? '') as keyof typeof DELIMITERS];
  const line = Number(asked.get('headerLine'));
  const isAsked = delimiter !== undefined && Number.isInteger(line) && line >= 1 && line <= 50;
  const said = !isAsked && one.mapping ? one.mapping : null;
  const shape = isAsked ? { delimiter, headerLine: line } : said ? shapeOf(said) : {};
  const head = await importHead({ networkId, id: one.id, zone }, shape);
  if (!head) return null;
  const typed: TypedMapping =
    posted?.text['action'] === 'map'
      ? typedMapping(posted.text, head.headings.length)
      : typedOf(said ?? head.guess);
  return { ...head, typed };
}

function shapeOf({ delimiter, headerLine }: NonNullable<Import['mapping']>) {
  return { delimiter, headerLine };
}

/** Columns that the form posted. */
function columnCount({ text }: FormValues): number {
  const places = Object.keys(text).flatMap((name) => /^column-(\d{1,3})$/.exec(name)?.[1] ?? []);
  return Math.min(MOST_COLUMNS, Math.max(0, ...places.map((place) => Number(place) + 1)));
}
