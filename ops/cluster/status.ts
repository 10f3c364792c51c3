import { askRoot } from './databases';
import type { Layout } from './layout';
import { pidOf, startedNames } from './processes';

const OF_NODE = `SELECT GROUP_CONCAT(CONCAT(LOWER(SUBSTRING(variable_name, 7)), ' ', variable_value) ORDER BY variable_name SEPARATOR ', ') AS told
  FROM information_schema.global_status
  WHERE variable_name IN ('WSREP_CLUSTER_SIZE', 'WSREP_CLUSTER_STATUS', 'WSREP_LOCAL_STATE_COMMENT', 'WSREP_FLOW_CONTROL_PAUSED')`;
const OF_DATA = `SELECT CONCAT(COUNT(*), ' tables, ', ROUND(COALESCE(SUM(data_length + index_length), 0) / 1048576), ' MiB') AS told
  FROM information_schema.tables WHERE table_schema NOT IN ('mysql', 'sys', 'information_schema', 'performance_schema')`;

/** Prints a line for each process. */
export async function tellStatus(layout: Layout): Promise<void> {
  for (const name of startedNames(layout).sort()) {
    const pid = pidOf(layout, name);
    console.log(
      `${name.padEnd(8)} ${pid === null ? 'does not run' : `runs (${pid})${await toldOf(layout, name)}`}`,
    );
  }
}

async function toldOf(layout: Layout, name: string): Promise<string> {
  const question = name.startsWith('head') ? OF_NODE : name.startsWith('data') ? OF_DATA : null;
  if (question === null) return '';
  const [row] = await askRoot(layout, name, question).catch(() => []);
  return `  ${String(row?.['told'] ?? 'does not answer')}`;
}
