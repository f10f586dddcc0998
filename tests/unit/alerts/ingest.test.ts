import { describe, expect, it } from 'vitest';
import { GRACE_MS, lookAtIngest, STALE_HEARTBEAT_MS, type IngestState } from '@/lib/core/alerts/ingest';

const START = Date.UTC(2026, 0, 10);
const MINUTE = 60_000;

/**
 * Plays one look a minute: `u` the ingest is up, `d` it is down (its last sign
 * of life is the last `u`), `-` nobody looks, `?` no ingest was ever here. Writes
 * `s` where silence counts and `.` where it does not, and the events.
 */
function play(minutes: string): { counts: string; events: string[] } {
  let state: IngestState | null = null;
  let beat: number | null = null;
  let counts = '';
  const events: string[] = [];
  [...minutes].forEach((what, index) => {
    const now = START + index * MINUTE;
    if (what === 'u') beat = now - 2_000;
    if (what === '-') return;
    const look = lookAtIngest(state, what === '?' ? null : (beat ?? START - 60 * MINUTE), now);
    state = JSON.parse(JSON.stringify(look.state)) as IngestState;
    counts += look.silenceCounts ? 's' : '.';
    for (const event of look.events) events.push(`${index} ${event.type}`);
  });
  return { counts, events };
}

describe('the watch over the ingest', () => {
  it('lets silence count while the ingest is up', () => {
    expect(play('uuuu')).toEqual({ counts: 'ssss', events: [] });
  });

  it('lets silence count where readings come over HTTP alone', () => {
    expect(play('????')).toEqual({ counts: 'ssss', events: [] });
  });

  it('stops counting silence in the first look that finds it down, long before it tells anybody', () => {
    expect(play('uddd')).toEqual({ counts: 's...', events: [] });
  });

  it('tells of an outage once, and once that it is over', () => {
    const { counts, events } = play(`u${'d'.repeat(20)}${'u'.repeat(5)}`);
    expect(events).toEqual(['5 opened', '22 resolved']);
    expect(counts).not.toContain('s.s');
  });

  it('does not tell of a restart', () => {
    expect(play('uuddduuuu').events).toEqual([]);
  });

  it('gives sensors half an hour to deliver what they kept', () => {
    const { counts } = play(`u${'d'.repeat(10)}${'u'.repeat(40)}`);
    expect(counts).toBe(`s${'.'.repeat(10)}${'.'.repeat(GRACE_MS / MINUTE)}${'s'.repeat(40 - GRACE_MS / MINUTE)}`);
  });

  it('knows nothing of a time when nobody looked', () => {
    const { counts } = play(`uu${'-'.repeat(20)}${'u'.repeat(32)}`);
    expect(counts).toBe(`ss${'.'.repeat(30)}ss`);
  });

  it('forgives a worker that was away for a moment', () => {
    expect(play('uu---uu').counts).toBe('ssss');
  });

  it('is not down while its sign of life is fresh', () => {
    const fresh = lookAtIngest(null, START - STALE_HEARTBEAT_MS, START);
    expect(fresh.silenceCounts).toBe(true);
    expect(lookAtIngest(fresh.state, START - STALE_HEARTBEAT_MS - 1, START).silenceCounts).toBe(false);
  });
});
