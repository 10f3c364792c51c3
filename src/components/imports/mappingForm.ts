import { importMappingSchema, type ImportMapping } from '#lib/contracts/imports';

/** Fields of the form that says what the columns are, as typed. */
export interface TypedMapping {
  delimiter: string;
  decimal: string;
  headerLine: string;
  dateOrder: string;
  zone: string;
  marks: string;
  seconds: string;
  columns: string[];
}

/** What a mapping looks like in the form. */
export function typedOf(mapping: ImportMapping): TypedMapping {
  return {
    ...mapping,
    headerLine: String(mapping.headerLine),
    seconds: mapping.seconds === null ? '' : String(mapping.seconds),
    columns: mapping.columns.map((column) => column ?? ''),
  };
}

/** The form's fields as posted. */
export function typedMapping(text: Readonly<Record<string, string>>, columnCount: number): TypedMapping {
  const of = (name: string) => text[name] ?? '';
  return {
    delimiter: of('delimiter'),
    decimal: of('decimal'),
    headerLine: of('headerLine'),
    dateOrder: of('dateOrder'),
    zone: of('zone'),
    marks: of('marks'),
    seconds: of('seconds'),
    columns: Array.from({ length: columnCount }, (_, at) => of(`column-${at}`)),
  };
}

/** Reads what was typed. @throws {ZodError} */
export function readMapping(typed: TypedMapping): ImportMapping {
  return importMappingSchema.parse({
    ...typed,
    delimiter: typed.delimiter === 'tab' ? '\t' : typed.delimiter,
    headerLine: Number(typed.headerLine),
    seconds: typed.seconds === '' ? null : Number(typed.seconds),
    columns: typed.columns.map((column) => (column === '' ? null : column)),
  });
}
