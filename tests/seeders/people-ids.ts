import { seededRandom } from '@/seeders/seeded-random';
import type { DemoPeopleIds } from '@/seeders/demo-people';

const random = seededRandom('people of the tests');
const id = () => random.id(Date.UTC(2023, 0, 1));

/** Ids as the server would give them, the same in every run. */
export const peopleIds: DemoPeopleIds = { administrator: id(), analyst: id(), lead: id(), crewA: id(), crewB: id(), neighbour: id() };
