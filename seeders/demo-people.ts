import type { Role } from '@/lib/schema/common';

export type DemoPersonKey = 'administrator' | 'analyst' | 'lead' | 'crewA' | 'crewB' | 'neighbour';

export type DemoPerson = {
  readonly key: DemoPersonKey;
  readonly name: string;
  readonly email: string;
  /** For the demo only; printed when it starts. */
  readonly password: string;
  readonly admin: boolean;
  readonly estateRole: Role | null;
  readonly tractRole: Role | null;
  /** What the person is there for, as printed. */
  readonly does: string;
};

/** Invented people at addresses that cannot exist (RFC 2606). */
export const demoPeople: readonly DemoPerson[] = [
  {
    key: 'administrator', name: 'Runa Velhart', email: 'runa@lammas.example', password: 'kettle-lantern-58-moss', admin: true,
    estateRole: null, tractRole: null, does: 'administrator',
  },
  {
    key: 'analyst', name: 'Tobin Askerel', email: 'tobin@lammas.example', password: 'granite-ribbon-31-owl', admin: false,
    estateRole: 'analyst', tractRole: 'analyst', does: 'analyst of both projects',
  },
  {
    key: 'lead', name: 'Edda Mournfell', email: 'edda@lammas.example', password: 'harness-copper-74-fern', admin: false,
    estateRole: 'lead', tractRole: null, does: 'crew lead of the estate',
  },
  {
    key: 'crewA', name: 'Joss Linnever', email: 'joss@lammas.example', password: 'mitten-compass-26-pine', admin: false,
    estateRole: 'crew', tractRole: 'crew', does: 'crew of both projects',
  },
  {
    key: 'crewB', name: 'Pia Carrowin', email: 'pia@lammas.example', password: 'thistle-barrow-93-creek', admin: false,
    estateRole: 'crew', tractRole: null, does: 'crew of the estate',
  },
  {
    key: 'neighbour', name: 'Wade Sollenby', email: 'wade@lammas.example', password: 'saddle-orchard-47-wren', admin: false,
    estateRole: null, tractRole: 'crew', does: 'crew of the tract only',
  },
];

/** User ids by key; they are given when the people are made. */
export type DemoPeopleIds = Readonly<Record<DemoPersonKey, string>>;
