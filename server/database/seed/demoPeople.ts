import type { Role } from '@shared/permissions';

export const demoPassword = 'crossed-polars';

export interface DemoPerson {
  readonly email: string;
  readonly name: string;
  readonly roles: readonly Role[];
}

/** The people of the demo's two schools, all with `demoPassword`; the first of each is the admin who makes the school. */
export const demoPeople = {
  portEllery: [
    { email: 'admin@portellery.example', name: 'Maeve Harte', roles: ['admin'] },
    { email: 'instructor@portellery.example', name: 'Tomas Lindqvist', roles: ['instructor'] },
    { email: 'second.instructor@portellery.example', name: 'Ines Carvalho', roles: ['instructor'] },
    { email: 'student@portellery.example', name: 'Ada Quill', roles: ['student'] },
    { email: 'other.student@portellery.example', name: 'Jonas Weir', roles: ['student'] },
  ],
  saltpan: [
    { email: 'admin@saltpan.example', name: 'Rosa Medeiros', roles: ['admin', 'instructor'] },
    { email: 'student@saltpan.example', name: 'Piet Marais', roles: ['student'] },
  ],
} as const satisfies Record<string, readonly DemoPerson[]>;
