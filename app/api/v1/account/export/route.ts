import { endpoints } from '@/lib/contracts/endpoints';
import { fileResponse } from '@/lib/http/file';
import { route } from '@/lib/http/route';
import { exportAccount } from '@/lib/services/people/export-account';

export const GET = route(endpoints.exportAccount, async ({ session, headers }) => fileResponse(await exportAccount(session.personId), { type: 'application/json', filename: 'fallbright-own-data.json', headers }));
