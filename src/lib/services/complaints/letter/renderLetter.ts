import type { LetterFacts } from './facts';
import { fieldByName, neededStatements } from './fields';

/** `{{name}}`, with or without spaces inside, which are not part of the name. Takes time in proportion to the text. */
const FIELD = /\{\{([^{}]*)\}\}/g;
/** A level that was typed by hand. */
const TYPED_LEVEL = /\d(?:[\d.,]{0,18}\d)?\s{0,9}(?:dB|decibel)/i;

/** What is wrong with a letter's text, each in plain words with the way out; none: it may be rendered. */
export function letterProblems(body: string): string[] {
  const unknown = [...new Set(namesIn(body).filter((name) => !fieldByName(name)))];
  const rest = body.replace(FIELD, '');
  const typed = TYPED_LEVEL.exec(rest)?.[0];
  return [
    ...unknown.map((name) => `has an unknown field {{${name}}}: choose one from the list`),
    ...(/\{\{|\}\}/.test(rest) ? ['has a field that is not closed: a field is written {{name}}'] : []),
    ...(typed ? [`has a level typed by hand (“${typed}”): put a field in its place, such as {{laeq}}`] : []),
  ];
}

/** What a letter leaves out that its figures do not go without: names of statements. A letter without figures needs none. */
export function missingStatements(body: string, facts: LetterFacts): string[] {
  const used = new Set(namesIn(body));
  const hasFigures = [...used].some((name) => isAboutData(name));
  return hasFigures ? neededStatements(facts).filter((name) => !used.has(name)) : [];
}

/** The letter as it is sent. A paragraph of fields that all have nothing to say goes. @throws {RangeError} for an unknown field. */
export function renderLetter(body: string, facts: LetterFacts): string {
  return body
    .replaceAll('\r\n', '\n')
    .split(/\n{2,}/)
    .map((paragraph) => renderParagraph(paragraph, facts))
    .filter((paragraph) => paragraph !== '')
    .join('\n\n');
}

function renderParagraph(paragraph: string, facts: LetterFacts): string {
  return paragraph
    .replace(FIELD, (_, inside: string) => {
      const name = inside.trim();
      const field = fieldByName(name);
      if (!field) throw new RangeError(`A letter has no field ${name}.`);
      return field.render(facts);
    })
    .split('\n')
    .map((line) => line.trim())
    .join('\n')
    .trim();
}

function isAboutData(name: string): boolean {
  const field = fieldByName(name);
  return field !== undefined && (field.kind === 'figure' || DATA_STATEMENTS.has(name));
}

const DATA_STATEMENTS = new Set(['measured', 'compared', 'limits', 'tones', 'second-station', 'elsewhere']);

function namesIn(body: string): string[] {
  return [...body.matchAll(FIELD)].map((match) => match[1]?.trim() ?? '');
}
