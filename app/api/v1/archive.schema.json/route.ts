import { z } from 'zod';
import { archiveSchema } from '@/lib/contracts/archive';
import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';

export const GET = route(endpoints.getArchiveSchema, async () => Response.json(z.toJSONSchema(archiveSchema, { io: 'input' }), { headers: { 'cache-control': 'public, max-age=3600' } }));
