import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { keepImport } from '@/lib/services/imports/keep';
import { listImports } from '@/lib/services/imports/list';

export const GET = route(endpoints.listImports, ({ actor }) => listImports(actor));
export const POST = route(endpoints.keepImport, ({ actor, body }) => keepImport(actor, body));
