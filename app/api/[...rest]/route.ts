import { problemResponse } from '@/lib/http/problem-response';

/** Whatever the API does not have: a program that mistypes an address gets a problem document, as for all else. */
const nowhere = (): Response => problemResponse('not-found', 'The API has no such address. /api/v1/openapi.json lists those that it has.');

export { nowhere as DELETE, nowhere as GET, nowhere as PATCH, nowhere as POST, nowhere as PUT };
