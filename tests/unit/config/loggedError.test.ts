import { Writable } from 'node:stream';
import pino from 'pino';
import { expect, test } from 'vitest';
import { failureWords } from '#lib/config/failureWords';
import { loggedError } from '#lib/config/loggedError';

const RESIDENT = 'Wilhelmina Canary';

/** As the database's driver and the query builder make them: the statement with its values is in the message and beside it. */
function failedStatement(): Error {
  const sql = `insert into \`complaint_private\` (\`name\`) values ('${RESIDENT}')`;
  const error = new Error(`${sql} - Duplicate entry '${RESIDENT}' for key 'x'`);
  return Object.assign(error, {
    sql,
    sqlMessage: `Duplicate entry '${RESIDENT}'`,
    code: 'ER_DUP_ENTRY',
    errno: 1062,
  });
}

function logged(error: unknown): string {
  let text = '';
  const stream = new Writable({
    write: (chunk: Buffer, _encoding, done) => {
      text += chunk.toString();
      done();
    },
  });
  pino({ serializers: { err: loggedError } }, stream).error({ err: error }, 'request failed');
  return text;
}

test.each([
  ['a failed statement', failedStatement()],
  ['one with a cause', new Error('The act failed.', { cause: failedStatement() })],
  ['several at once', new AggregateError([failedStatement()], 'Some failed.')],
])('no value of a statement goes into the log: %s', (_, error) => {
  const text = logged(error);
  expect(text).toContain('ER_DUP_ENTRY');
  expect(text).toContain('complaint_private');
  expect(text).not.toContain('Canary');
});

test('other errors keep their words and where they arose', () => {
  const text = logged(new RangeError('There is nothing to tell.'));
  expect(text).toContain('There is nothing to tell.');
  expect(text).toContain('loggedError.test.ts');
  expect(failureWords(failedStatement())).toBe('database: ER_DUP_ENTRY at complaint_private');
});
