import { listAlertPeople } from '#db/queries/alertPreferences';
import { appendAudit } from '#db/queries/audit';
import { inTransaction } from '#db/queries/connection';
import { listEscalationSteps, setEscalationSteps, type EscalationStep } from '#db/queries/escalation';
import type { EscalationStepInput } from '#lib/contracts/alerts';
import { done, invalid, type Outcome } from '../outcome';

/** A network's steps, and who may be named: who may acknowledge there. */
export async function escalationOf(
  networkId: number,
): Promise<{ steps: EscalationStep[]; people: { userId: string; name: string }[] }> {
  const [steps, people] = await Promise.all([listEscalationSteps(networkId), listAlertPeople(networkId)]);
  const named = people.filter(({ isOperator }) => isOperator).map(({ userId, name }) => ({ userId, name }));
  return { steps, people: named };
}

/** Sets a network's steps, in the place of those set before. They hold for what is found from now on. */
export async function changeEscalation(
  { networkId, userId }: { networkId: number; userId: string },
  input: readonly EscalationStepInput[],
): Promise<Outcome<null>> {
  const mayBeNamed = new Set((await escalationOf(networkId)).people.map((person) => person.userId));
  for (const [index, { afterMinutes, people }] of input.entries()) {
    const before = input[index - 1];
    if (before && afterMinutes <= before.afterMinutes) {
      return invalid(`after${index + 1}`, 'must be later than the step before');
    }
    if (people.some((person) => !mayBeNamed.has(person))) {
      return invalid(`people${index + 1}`, 'must be people who may acknowledge in this network');
    }
  }
  const after = input.map(({ afterMinutes, people }, index) => ({
    step: index + 1,
    afterMin: afterMinutes,
    userIds: people,
  }));
  await inTransaction(async (transaction) => {
    const before = await listEscalationSteps(networkId, transaction);
    await setEscalationSteps(networkId, after, userId, transaction);
    await appendAudit(
      {
        userId,
        networkId,
        action: 'escalation.change',
        subject: `network ${networkId}`,
        detail: { before, after },
      },
      transaction,
    );
  });
  return done(null);
}
