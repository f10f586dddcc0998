import { describe, expect, it } from 'vitest';
import { feedDue, type FeedInput } from '@/lib/core/rounds/feed';
import { wantedJobs, type RoundsInput } from '@/lib/core/rounds/wanted';
import { CALL_NAMES, type Call, type CallName } from '@/lib/core/types';

const HOUR = 3_600_000;
const AT = Date.UTC(2031, 4, 6, 18);
/** A mead of 1.100 that needs 250 mg/L and has 50; a tenth of its sugar gone at 1.090. */
const mead = (over: Partial<FeedInput> = {}): FeedInput => ({ stage: 'peak', fedAt: null, at: AT, volumeL: 4.5, neededMgL: 250, givenMgL: 50, givenG: 0, originalGravity: 1.1, gravity: 1.088, expectedFinal: 1.0, abvPercent: 1.5, ...over });
const quiet: Call = { verdict: 'no', kind: null, since: null, expectedAt: null, headline: '', reason: '', act: null, changesIt: null, evidence: [] };
const rounds = (over: Partial<RoundsInput>): RoundsInput => ({ name: 'Mead', neck: 'blow_off', stage: 'peak', pitchedAt: AT - 40 * HOUR, parted: null, floatAt: AT, readAt: null, airlockAt: null, feed: null, clearing: false, at: AT, calls: Object.fromEntries(CALL_NAMES.map((name) => [name, quiet])) as Record<CallName, Call>, ...over });

describe('a feed', () => {
  it('is due by the sugar used, in the portion of the plan, and tells why', () => {
    const feed = feedDue(mead());
    // Held to 0.6 g/L: 2.7 g over the three portions that are left.
    expect(feed).toMatchObject({ portion: 2, grams: 0.9 });
    expect(feed?.note).toContain('12 % of its sugar is used');
    expect(feed?.note).toContain('foams over');
  });

  it('is not asked before the yeast works, nor once half of the sugar is gone', () => {
    expect(feedDue(mead({ stage: 'lag' }))).toBeNull();
    expect(feedDue(mead({ gravity: 1.045 }))).toBeNull();
    expect(feedDue(mead({ stage: 'terminal', gravity: 1.0 }))).toBeNull();
  });

  it('is not asked again within half a day, nor of a must that has enough', () => {
    expect(feedDue(mead({ fedAt: AT - 11 * HOUR }))).toBeNull();
    expect(feedDue(mead({ fedAt: AT - 13 * HOUR }))).not.toBeNull();
    expect(feedDue(mead({ givenMgL: 240 }))).toBeNull();
  });

  it('never passes the limit of the nutrient, however hungry the must', () => {
    expect(feedDue(mead({ neededMgL: 900, givenG: 2.7 }))).toBeNull();
  });

  it('is another job for each portion, so that a ticked one does not hide the next', () => {
    const job = (portion: number) => wantedJobs(rounds({ feed: { portion, grams: 0.9, of: 'complex yeast nutrient', note: 'why' } }))[0];
    expect(job(1)).toMatchObject({ kind: 'feed', title: 'Feed Mead: 0.9 g of complex yeast nutrient', dueAt: null });
    expect(job(1)?.occasion).not.toBe(job(2)?.occasion);
  });
});
