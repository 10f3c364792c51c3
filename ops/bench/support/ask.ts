import { closeDb } from '#db/client';
import { findNetworkBySlug } from '#db/queries/networks';
import { findStation } from '#db/queries/stations';
import { encodeSpectrogram } from '#lib/contracts/spectrogramBinary';
import { spectrogram } from '#lib/services/levels/spectrogram';
import { periodStatistics } from '#lib/services/levels/statistics';
import { FIRST_SEC, MONTH_SEC } from './months';

/** Asks what pages ask, four times each, and prints the highest resident memory in MiB. Started by `memory.ts`. */
const network = await findNetworkBySlug('bench');
const station = network && (await findStation(network.id, 'MINUTES'));
if (!station) throw new Error('There is no station to ask about.');
const month = { fromSec: FIRST_SEC, toSec: FIRST_SEC + MONTH_SEC };
for (let round = 0; round < 4; round += 1) {
  await periodStatistics({ station, ...month });
  await periodStatistics({ station, ...month, toSec: FIRST_SEC + 12 * MONTH_SEC });
  encodeSpectrogram(await spectrogram({ station, ...month, mostColumns: 4000 }));
  encodeSpectrogram(await spectrogram({ station, ...month, mostColumns: 43_200 }));
}
await closeDb();
console.log(process.resourceUsage().maxRSS / 1024);
