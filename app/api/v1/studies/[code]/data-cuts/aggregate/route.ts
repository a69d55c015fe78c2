import { acceptAggregate } from '@/lib/data-cuts/commands';
import { acceptAggregateOperation } from '@/lib/data-cuts/operations';
import { route } from '@/lib/http/route';

export const POST = route(acceptAggregateOperation, acceptAggregate);
