import { assignComplaint, listAnswerers } from '#db/queries/complaintDesk';
import { actOnComplaint, type DeskAct, type DeskOutcome } from './deskAct';

/** Gives a complaint to a person who answers in the network, or (null) to nobody in particular. */
export function assignCase(act: DeskAct, to: string | null): Promise<DeskOutcome> {
  return actOnComplaint(act, async (complaint, transaction) => {
    const people = await listAnswerers(act.network.id, transaction);
    const person = people.find(({ id }) => id === to);
    if (to !== null && !person) return 'This person does not answer complaints here. Nothing was changed.';
    await assignComplaint(complaint.id, to, transaction);
    return {
      action: 'complaint.assign',
      detail: { from: complaint.assignedToName, to: person?.name ?? null },
    };
  });
}

/** People that complaints of a network can be given to. */
export async function answerersOf(networkId: number): Promise<{ id: string; name: string }[]> {
  return (await listAnswerers(networkId)).map(({ id, name }) => ({ id, name }));
}
