import type { Role } from '../shared/words';

/** Invented people of the demo; the passwords are for a demo on one's own machine only. */
export const DEMO_GROUP = 'Lantern Field Group';

export interface DemoPerson {
  role: Role;
  name: string;
  email: string;
  password: string;
}

export const DEMO_OWNER: DemoPerson = {
  role: 'owner',
  name: 'Mirela Tannock',
  email: 'mirela@example.org',
  password: 'lantern-owner-1',
};

export const DEMO_MEMBERS: readonly DemoPerson[] = [
  { role: 'curator', name: 'Odo Brankovic', email: 'odo@example.org', password: 'lantern-curator-1' },
  { role: 'contributor', name: 'Sunniva Achterberg', email: 'sunniva@example.org', password: 'lantern-contributor-1' },
  { role: 'reader', name: 'Teodor Vale', email: 'teodor@example.org', password: 'lantern-reader-1' },
];
