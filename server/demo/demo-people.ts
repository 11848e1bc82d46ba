import type { Role } from '@riseback/contracts';

/** Everyone's, and printed at the start: the demo is for one's own machine and is never seeded in production. */
export const DEMO_PASSWORD = 'demo-tern-quay';

interface DemoPerson {
  readonly email: string;
  readonly name: string;
  /** At the demo site; the stranger has none. */
  readonly role?: Role;
}

/** Invented people, one for each role. */
export const DEMO_PEOPLE: readonly [DemoPerson, ...DemoPerson[]] = [
  { email: 'designer@ternquay.example', name: 'Ines Kallan', role: 'designer' },
  { email: 'admin@ternquay.example', name: 'Maud Ferrant', role: 'administrator' },
  { email: 'commissioning@ternquay.example', name: 'Tobin Achter', role: 'commissioning' },
  { email: 'reviewer@ternquay.example', name: 'Greta Lowndes', role: 'reviewer' },
  { email: 'viewer@ternquay.example', name: 'Sunil Parrow', role: 'viewer' },
  { email: 'stranger@ternquay.example', name: 'Odo Vance' },
];
