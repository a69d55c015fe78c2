import { route } from '@/lib/http/route';
import { listPeopleOperation } from '@/lib/people/operations';
import { listPeople } from '@/lib/people/queries';

export const GET = route(listPeopleOperation, listPeople);
