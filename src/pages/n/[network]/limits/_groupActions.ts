import { newStationGroupSchema } from '#lib/contracts/stationGroups';
import type { FormValues } from '#lib/http/forms';
import { idOf, valueOf } from '#lib/http/outcome';
import { addStationGroup, changeStationGroup, removeStationGroup } from '#lib/services/stationGroups/change';

/** Does what the page's forms ask: makes a group, changes the one that is named, or deletes it. @throws {Problem} */
export async function actOnGroup(
  actor: { networkId: number; userId: string },
  { text, all }: FormValues,
): Promise<void> {
  const groupId = text['group'];
  if (groupId !== undefined && text['act'] === 'delete') {
    valueOf(await removeStationGroup(actor, idOf(groupId)));
    return;
  }
  const group = newStationGroupSchema.parse({ name: text['name'] ?? '', stations: all('stations') });
  valueOf(
    groupId === undefined
      ? await addStationGroup(actor, group)
      : await changeStationGroup(actor, idOf(groupId), group),
  );
}
