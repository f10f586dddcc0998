import { expect, it } from 'vitest';
import { became } from '@/components/book/became';

it('what became of bottles is one list, newest first, whether they were opened or moved', () => {
  const opening = (at: string) => ({ at }) as Parameters<typeof became>[0]['openings'][number];
  const move = (at: string) => ({ at }) as Parameters<typeof became>[0]['moves'][number];
  const list = became({ openings: [opening('2026-09-28T12:00:00Z'), opening('2026-08-26T12:00:00Z')], moves: [move('2026-09-04T12:00:00Z')] });
  expect(list.map(({ what, row }) => `${what} ${row.at.slice(5, 10)}`)).toEqual(['opening 09-28', 'move 09-04', 'opening 08-26']);
});
