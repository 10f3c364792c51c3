/** What is wrong with a field, in words. */
export interface FieldProblem {
  field: string;
  message: string;
}

/** What came of an act: its value, or why nothing was changed. */
export type Outcome<T> =
  | { kind: 'done'; value: T }
  | { kind: 'invalid'; problems: FieldProblem[] }
  /** The network has no such thing; `what` says which. */
  | { kind: 'unknown'; what: string }
  /** Somebody did it before. */
  | { kind: 'before'; code: string; detail: string };

export const done = <T>(value: T): Outcome<T> => ({ kind: 'done', value });

export const invalid = (field: string, message: string): Outcome<never> => ({
  kind: 'invalid',
  problems: [{ field, message }],
});

export const unknown = (what: string): Outcome<never> => ({ kind: 'unknown', what });
