import { closeDb } from '#db/client';
import { config } from '#lib/config/index';
import { seedDemo } from './seed';

await seedDemo(config(), (line) => console.log(`  ${line}`));
await closeDb();
