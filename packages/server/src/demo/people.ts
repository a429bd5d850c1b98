import type { GroupRole } from '@stillroom/shared/roles';

/** One password for all: a demo installation hides nothing, and says so on its sign-in page. */
export const demoPassword = 'demo-stillroom';

interface DemoPerson {
  readonly key: string;
  readonly name: string;
  readonly email: string;
  readonly operator?: boolean;
  /** Shown on the sign-in page under this word; people without one stand in the background. */
  readonly shownAs?: string;
}

/** Invented people, in the order that gives them their colours. */
export const demoPeople: readonly DemoPerson[] = [
  { key: 'ilse', name: 'Ilse Marrowby', email: 'ilse@brewhouse-kinetics.example', shownAs: 'lead' },
  { key: 'dov', name: 'Dov Hartrigg', email: 'dov@brewhouse-kinetics.example', shownAs: 'author' },
  { key: 'nadia', name: 'Nadia Okonvale', email: 'nadia@brewhouse-kinetics.example', shownAs: 'author' },
  { key: 'rurik', name: 'Rurik Selwyth', email: 'rurik@tidewater.example', shownAs: 'remarker' },
  { key: 'anouk', name: 'Anouk Pellarin', email: 'anouk@ring-chain.example' },
  { key: 'tamsin', name: 'Tamsin Wexcombe', email: 'tamsin@maltings.example', shownAs: 'reader' },
  {
    key: 'orla',
    name: 'Orla Benning',
    email: 'orla@stillroom.example',
    operator: true,
    shownAs: 'operator',
  },
];

interface DemoGroup {
  readonly name: string;
  /** By key of the person; the first is the lead who opens the group. */
  readonly members: readonly (readonly [string, GroupRole])[];
  /** File in `notebooks/`, without its ending. */
  readonly notebook: string;
  readonly remarks: readonly DemoRemark[];
}

interface DemoRemark {
  readonly by: string;
  readonly cell: string;
  readonly quote: string;
  readonly text: string;
}

/** Groups with one notebook each. */
export const demoGroups: readonly DemoGroup[] = [
  {
    name: 'Brewhouse Kinetics',
    members: [
      ['ilse', 'lead'],
      ['dov', 'author'],
      ['nadia', 'author'],
      ['rurik', 'remarker'],
      ['tamsin', 'reader'],
    ],
    notebook: 'diacetyl-rest',
    remarks: [
      {
        by: 'rurik',
        cell: 'question',
        quote: 'the one it ends in',
        text: 'Say that the pitch rate sets the start. Readers will ask who chooses.',
      },
      {
        by: 'ilse',
        cell: 'shape',
        quote: '',
        text: 'Still 1 without the dead end, so the deficiency alone does not tell us why it stalls. The claim has to rest on the roots.',
      },
    ],
  },
  {
    name: 'Ring and Chain',
    members: [
      ['anouk', 'lead'],
      ['nadia', 'author'],
      ['ilse', 'author'],
      ['tamsin', 'reader'],
    ],
    notebook: 'beads-on-a-ring',
    remarks: [],
  },
  {
    name: 'Tidewater Epidemics',
    members: [
      ['rurik', 'lead'],
      ['ilse', 'author'],
      ['dov', 'remarker'],
      ['tamsin', 'reader'],
    ],
    notebook: 'norovirus-aboard-a-ferry',
    remarks: [],
  },
];

/** The record that is under review from the first start on. */
export const demoReview = {
  notebook: 'diacetyl-rest',
  /** Why the open remarks may stay open; printed in the record. */
  reasons: { remarks: 'Both concern the wording, not a result; the next version takes them up.' },
  reviewer: {
    email: 'tobias@quenell.example',
    name: 'Tobias Quenell',
    masked: true,
    message: 'Please look hardest at the claim “stalls”: the whole note rests on it.',
  },
  days: 180,
} as const;
