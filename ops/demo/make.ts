import { closeDb } from '#db/client';
import { config } from '#lib/config/index';
import { seedPlants } from './plants';
import { seedDemo } from './seed';

await seedDemo(config(), (line) => console.log(`  ${line}`));
console.log(`  ${await seedPlants(config().demo.days)}`);
await closeDb();
