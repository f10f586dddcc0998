import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { streamedFile } from '@/lib/http/stream-file';
import { exportArchive } from '@/lib/services/exports/archive';

export const GET = route(endpoints.exportCellar, async ({ actor, query }) => streamedFile(await exportArchive(actor, query.batch ?? null), { type: 'application/json; charset=utf-8', filename: query.batch ? 'batch.json' : 'cellar.json' }));
