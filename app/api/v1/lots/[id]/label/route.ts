import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { getLabelFacts } from '@/lib/services/labels/facts';

export const GET = route(endpoints.getLabelFacts, ({ actor, params }) => getLabelFacts(actor, params.id));
