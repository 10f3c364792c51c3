import { letterProblems, missingStatements, renderLetter } from '../letter/renderLetter';
import { sampleFacts, type SampleCase } from './sampleFacts';

/** A template on the figures of a sample case. */
export interface TemplatePreview {
  /** Null where it has what no letter may have. */
  text: string | null;
  problems: string[];
  /** Statements that a letter on these figures would lack. */
  missing: string[];
}

/** What a template would say on invented figures of some case. */
export function previewTemplate(
  body: string,
  sample: SampleCase,
  networkName: string,
  signedBy: string,
): TemplatePreview {
  const problems = letterProblems(body);
  if (problems.length > 0) return { text: null, problems, missing: [] };
  const facts = sampleFacts(sample, networkName, signedBy);
  return { text: renderLetter(body, facts), problems, missing: missingStatements(body, facts) };
}
