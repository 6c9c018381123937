import type { Role } from '../../shared/contract/roles.js';

export interface DemoPerson {
  readonly id: string;
  readonly name: string;
  readonly shortName: string;
  readonly worksNumber: string | null;
  readonly email: string | null;
  readonly role: Role;
  /** Which of the three crews; the crews change patterns week by week. Null: managers. */
  readonly crew: number | null;
  /** Loom numbers in walking order. */
  readonly usualSet: readonly number[];
}

/** Four sets of six; each straddles an alley, since a weaver stands between two rows. */
export const USUAL_SETS: readonly (readonly number[])[] = [
  [1, 2, 3, 9, 8, 7],
  [4, 5, 6, 12, 11, 10],
  [13, 14, 15, 21, 20, 19],
  [16, 17, 18, 24, 23, 22],
];

/** Invented, like everything here. A crew: four weavers, a tackler, a foreman. */
const CREWS = [
  {
    weavers: ['Nuala Doran', 'Kit Imrie', 'Sanja Petrak', 'Amos Lowe'],
    tackler: 'Bram Oakshaw',
    foreman: 'Orla Minnis',
  },
  {
    weavers: ['Tove Lindqvar', 'Percy Dunnage', 'Imani Sallow', 'Gwen Haddockby'],
    tackler: 'Rufus Tench',
    foreman: 'Callum Weir-Asby',
  },
  {
    weavers: ['Yusuf Karelan', 'Dilys Penharrow', 'Mattis Brok', 'Ada Fernihope'],
    tackler: 'Jonas Pike',
    foreman: 'Roshni Vael',
  },
] as const;

const MANAGERS = ['Harriet Quillfeather', 'Edmund Sorley'] as const;

/** Works numbers start at 101 (weavers), 201 (tacklers), 301 (foremen); managers sign in at a desk only. */
export function demoPeople(): DemoPerson[] {
  const people: DemoPerson[] = [];
  CREWS.forEach((crew, c) => {
    crew.weavers.forEach((name, i) => {
      people.push(person(name, 'weaver', 101 + c * 4 + i, c, USUAL_SETS[i] ?? []));
    });
  });
  CREWS.forEach((crew, c) => people.push(person(crew.tackler, 'tackler', 201 + c, c)));
  CREWS.forEach((crew, c) => people.push(person(crew.foreman, 'foreman', 301 + c, c)));
  for (const name of MANAGERS) people.push(person(name, 'manager', null, null));
  return people;
}

function person(
  name: string,
  role: Role,
  worksNumber: number | null,
  crew: number | null,
  usualSet: readonly number[] = [],
): DemoPerson {
  const [first = name, last = ''] = name.split(' ');
  const office = role === 'foreman' || role === 'manager';
  return {
    id: `demo-${first.toLowerCase()}`,
    name,
    shortName: `${first} ${last.slice(0, 1)}.`,
    worksNumber: worksNumber === null ? null : String(worksNumber),
    email: office ? `${first.toLowerCase()}@wendlebeck.example` : null,
    role,
    crew,
    usualSet,
  };
}
