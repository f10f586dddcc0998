import { describe, expect, it } from 'vitest';
import { fallOf } from '@/components/share/fall';

const DAY = 86_400;
const NOW = Date.parse('2026-12-02T05:00:00Z');
const pitched = NOW / 1000 - 40 * DAY;
const iso = (at: number) => new Date(at * 1000).toISOString();
const gravityOf = (day: number) => 1 + 0.088 * Math.exp(-day / 5);

/** Read every hour for 40 days, racked after 26: the fitted curve begins anew there and goes on past now. */
const at = Array.from({ length: 960 }, (_, hour) => pitched + hour * 3600);
const shared = {
  ended_at: null,
  entries: [{ kind: 'reading' as const, at: iso(pitched), gravity: 1.088 }],
  series: { from: iso(pitched), to: iso(NOW / 1000), count: at.length, at, gravity: at.map((time) => gravityOf((time - pitched) / DAY)), temperature: at.map(() => null) },
  curve: Array.from({ length: 30 }, (_, day) => ({ at: iso(pitched + (26 + day) * DAY), gravity: 1, lo: 0.999, hi: 1.001 })),
};

describe('the fall on a shared page', () => {
  it('begins at the pitch, though the curve begins anew at a racking', () => {
    const { line, read } = fallOf(shared, NOW);
    expect(line[0]!.at).toBe(pitched);
    expect(line[0]!.gravity).toBeGreaterThan(1.08);
    expect(read).toEqual([{ at: pitched, gravity: 1.088 }]);
    const times = line.map((point) => point.at);
    expect(times).toEqual([...times].sort((a, b) => a - b));
  });

  it('ends now: what has not happened is not shown', () => {
    const { line } = fallOf(shared, NOW);
    expect(line.at(-1)!.at).toBeLessThanOrEqual(NOW / 1000);
    expect(fallOf({ ...shared, ended_at: iso(pitched + 30 * DAY) }, NOW).line.at(-1)!.at).toBeLessThanOrEqual(pitched + 30 * DAY);
  });

  it('goes down to where the curve will end while it works, and to its own end once it has ended', () => {
    const working = { ...shared, curve: shared.curve.map((point, day) => ({ ...point, gravity: 1.05 - 0.002 * day })) };
    const lowest = (until: number) => Math.min(...working.curve.filter((point) => Date.parse(point.at) <= until * 1000).map((point) => point.gravity));
    const { line, floor } = fallOf(working, NOW);
    expect(floor).toBe(lowest(Infinity));
    expect(line.at(-1)!.gravity).toBeGreaterThan(floor!);
    const ended = pitched + 30 * DAY;
    expect(fallOf({ ...working, series: { ...shared.series, count: 0, at: [], gravity: [], temperature: [] }, ended_at: iso(ended) }, NOW).floor).toBe(lowest(ended));
  });

  it('is told by the readings where nothing was fitted, and by the hand where nothing was sent', () => {
    expect(fallOf({ ...shared, curve: [] }, NOW).line).toHaveLength(960);
    expect(fallOf({ ...shared, curve: [], series: { ...shared.series, count: 0, at: [], gravity: [], temperature: [] } }, NOW).line).toHaveLength(1);
  });
});
