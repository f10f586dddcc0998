import type { LotBody } from '@/lib/contracts/lots';

/** What happened to bottles of a lot: they were opened, given, broken, or stood elsewhere. */
export type Happening = { what: 'opening'; row: LotBody['openings'][number] } | { what: 'move'; row: LotBody['moves'][number] };

/** Both in one order, newest first: where a bottle stood when it was opened is read off the line below. */
export const became = (lot: Pick<LotBody, 'openings' | 'moves'>): Happening[] =>
  [...lot.openings.map((row) => ({ what: 'opening' as const, row })), ...lot.moves.map((row) => ({ what: 'move' as const, row }))].sort((a, b) => Date.parse(b.row.at) - Date.parse(a.row.at));
