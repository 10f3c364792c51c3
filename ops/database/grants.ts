import { schemaTables } from '#db/appRights';
import { appGrants } from './appAccount';

const USAGE = `Prints the rights that web and worker need, for a database server that is not Bittern's own:
  npx tsx ops/database/grants.ts DATABASE USER HOST | mariadb
Run it again after each upgrade. HOST is where web and worker connect from, such as 127.0.0.1.`;

const [database = '', user = '', host = '', ...more] = process.argv.slice(2);
if (!/^\w{1,64}$/.test(database) || user === '' || host === '' || more.length > 0) {
  console.error(USAGE);
  process.exitCode = 2;
} else {
  for (const statement of appGrants(database, schemaTables(), { user, host })) console.log(`${statement};`);
}
