import type { Role } from '#db/queries/users';

/** Printed at the start for everybody to read: the demo stays on loopback with it. */
export const DEFAULT_DEMO_PASSWORD = 'low-boom-carries-far';

export interface DemoAccount {
  email: string;
  name: string;
  role: Role | null;
  /** What to try with it, in words. */
  does: string;
}

export const DEMO_ACCOUNTS: DemoAccount[] = [
  {
    email: 'operator@merrow.example',
    name: 'Ines Operator',
    role: 'operator',
    does: 'runs the network: stations, limits, exceedances',
  },
  { email: 'liaison@merrow.example', name: 'Tobias Liaison', role: 'liaison', does: 'answers complaints' },
  {
    email: 'regulator@merrow.example',
    name: 'Maud Regulator',
    role: 'regulator',
    does: 'reads, downloads the months',
  },
  { email: 'admin@merrow.example', name: 'Ravi Administrator', role: null, does: 'networks, people, roles' },
];
