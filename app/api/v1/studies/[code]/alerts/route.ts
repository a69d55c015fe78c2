import { listSentAlertsOperation } from '@/lib/alerts/operations';
import { listSentAlerts } from '@/lib/alerts/queries';
import { route } from '@/lib/http/route';

export const GET = route(listSentAlertsOperation, listSentAlerts);
