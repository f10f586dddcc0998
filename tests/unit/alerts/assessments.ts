import { CALL_NAMES, type Assessment, type Call, type CallName, type Instant, type Verdict } from '@/lib/core/types';

/** A call that says only what a test is about. */
export function callWith(verdict: Verdict, overrides: Partial<Call> = {}): Call {
  return { verdict, kind: null, since: null, expectedAt: null, headline: `It is ${verdict}.`, reason: 'Because the test says so.', act: null, changesIt: null, evidence: [], ...overrides };
}

/** A judgement of a working batch with fresh data, in which every call says no unless told. */
export function assessmentWith(at: Instant, { calls = {}, ...overrides }: Partial<Omit<Assessment, 'calls'>> & { calls?: Partial<Record<CallName, Call>> } = {}): Assessment {
  return {
    at,
    stage: 'slowing',
    gravity: { value: 1.02, lo: 1.019, hi: 1.021 },
    lastGravity: { at: at - 15 * 60_000, value: 1.02 },
    temperatureC: 20,
    lastReadingAt: at - 15 * 60_000,
    ratePointsPerDay: { value: 3, lo: 2.5, hi: 3.5 },
    gasLPerH: { value: 0.3, lo: 0.2, hi: 0.4 },
    finalGravity: null,
    terminalAt: null,
    abvPercent: 4,
    expectedAbvPercent: 5,
    attenuationPercent: 60,
    calls: Object.fromEntries(CALL_NAMES.map((name) => [name, calls[name] ?? callWith('no')])) as Assessment['calls'],
    ...overrides,
  };
}
