import { missingMonths } from '#db/partitions/months';
import { listParted, onPartedServers, splitOpen } from '#db/partitions/parted';

/** Has a partition for each month before it begins, wherever tables are parted by months. */
export async function makePartitions(now: Date): Promise<string> {
  let made = 0;
  await onPartedServers(async (connection) => {
    for (const parted of await listParted(connection)) {
      const months = missingMonths(parted.partitions, now.getTime() / 1000);
      await splitOpen(connection, parted, months);
      made += months.length;
    }
  });
  return `${made} made`;
}
