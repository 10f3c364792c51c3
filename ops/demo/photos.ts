import { addPhoto } from '#lib/services/photos/photos';
import { drawStation } from './photoScene';
import { must } from './must';
import type { DemoStation } from './stations';

const DAY_MS = 86_400_000;

/** Gives every station a picture of how it stands, drawn and said to be so; answers how many. */
export async function seedPhotos(
  userId: string,
  stations: readonly DemoStation[],
  historyDays: number,
): Promise<number> {
  for (const [at, { site, station }] of stations.entries()) {
    const joinedMs = Date.now() - (site.joinedDaysAgo ?? historyDays) * DAY_MS;
    const takenOn = new Date(joinedMs).toISOString().slice(0, 10);
    const caption = `${site.name}, the day it was set up (drawn for the demo)`;
    must(
      await addPhoto(
        { station, userId },
        { caption, takenOn },
        drawStation(site.placement, site.mastHeightM, at + 1),
      ),
    );
  }
  return stations.length;
}
