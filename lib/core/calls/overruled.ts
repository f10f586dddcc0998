import { CALL_NAMES, type Assessment, type CallName, type Verdict } from '../types';

/** What a person set aside: the call, and what it said then. It holds until the call says something else. */
export interface Overruling {
  call: CallName;
  verdict: Verdict;
  kind: string | null;
}

/** Whether a call is still the one that was set aside. */
export const isInForce = (overruling: Overruling, call: { verdict: Verdict; kind: string | null }): boolean => overruling.verdict === call.verdict && overruling.kind === call.kind;

/**
 * The judgement as it is acted on: a call that a person has overruled alerts
 * nobody and makes no job. The judgement itself is shown as it is, beside what the
 * person said.
 */
export function heeded(assessment: Assessment, overrulings: readonly Overruling[]): Assessment {
  const calls = { ...assessment.calls };
  for (const name of CALL_NAMES) {
    const call = calls[name];
    if (overrulings.some((one) => one.call === name && isInForce(one, call))) calls[name] = { ...call, verdict: 'no', kind: null, expectedAt: null };
  }
  return { ...assessment, calls };
}
