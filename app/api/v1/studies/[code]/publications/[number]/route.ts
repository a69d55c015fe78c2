import { route } from '@/lib/http/route';
import { getPublicationOperation } from '@/lib/publications/operations';
import { getPublication } from '@/lib/publications/queries';

export const GET = route(getPublicationOperation, getPublication);
