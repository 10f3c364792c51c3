import type { Connection } from 'mysql2/promise';
import type { Config } from '#lib/config/config';
import { Ending, EXIT } from './ending';
import { hasKeptFiles } from './keptFiles';
import { tableNames, valueOf } from './server';

/**
 * Makes sure that a restore destroys nothing that nobody meant: with `mayReplace` the tables that are there are dropped, else there
 * may be none, and no files. Nobody else may be using the database either way.
 * @throws {Ending}
 */
export async function makeRoom(connection: Connection, settings: Config, mayReplace: boolean): Promise<void> {
  const others = await valueOf(
    connection,
    'SELECT COUNT(*) FROM information_schema.processlist WHERE db = DATABASE() AND id <> CONNECTION_ID()',
  );
  if (Number(others) > 0) {
    throw new Ending(
      EXIT.notEmpty,
      `${others} other connections use ${settings.database.name}: stop web and worker first.`,
    );
  }
  const tables = await tableNames(connection);
  const hasFiles = await hasKeptFiles(settings.dataDir, settings.backup.dir);
  if (!mayReplace && (tables.length > 0 || hasFiles)) {
    const found = tables.length > 0 ? `${tables.length} tables` : 'files';
    throw new Ending(
      EXIT.notEmpty,
      `There are ${found} in this instance already. --replace drops all tables first; files stay and are added to.`,
    );
  }
  for (const table of tables) await connection.query('DROP TABLE ??', [table]);
}
