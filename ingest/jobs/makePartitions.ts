import { missingMonths } from '#db/partitions/months';
import { listParted, onPartedServers, splitOpen } from '#db/partitions/parted';
import { eachAlone } from './alone';

/** Has a partition for each month before it begins, wherever tables are parted by months. */
export async function makePartitions(now: Date): Promise<string> {
  let made = 0;
  await onPartedServers(async (connection) => {
    const subjectOf = ({ table }: { table: string }) => ({ name: `table ${table}`, networkId: null });
    const parted = await listParted(connection);
    made += await eachAlone(
      'make-partitions',
      parted,
      subjectOf,
      async (one) => {
        const months = missingMonths(one.partitions, now.getTime() / 1000);
        await splitOpen(connection, one, months);
        return months.length;
      },
      now,
    );
  });
  return `${made} made`;
}
