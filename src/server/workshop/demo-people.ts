import type { Role } from '../../contract/roles.ts';

/** The demo workshop's people. Invented; the addresses are under a domain reserved for examples (RFC 2606). */
export const DEMO_WORKSHOP = 'Quillmoor Motor School (demo)';

/** Demo only: known to everybody, and refused by a production setting. */
export const DEMO_PASSWORD = 'crank-and-cam-demo';

export const DEMO_PEOPLE: readonly { readonly email: string; readonly name: string; readonly role: Role }[] =
  [
    { email: 'owner@demo.example', name: 'Tove Ashgarth', role: 'owner' },
    { email: 'instructor@demo.example', name: 'Rurik Penhallen', role: 'instructor' },
    { email: 'technician@demo.example', name: 'Ines Corvale', role: 'technician' },
    { email: 'learner@demo.example', name: 'Milo Brandreth', role: 'learner' },
  ];
