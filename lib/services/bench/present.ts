import { snakeKeys } from '@/lib/contracts/case';
import { benchVerdictSchema, type BenchForm, type BenchVerdictBody } from '@/lib/contracts/bench';
import type { BenchDose, BenchRequest, BenchVerdict, WayOut } from '@/lib/core/bottling/bench';
import type { DoneCheck } from '@/lib/core/bottling/done';
import { isoOrNull } from '../iso';

export const presentDone = (done: DoneCheck) => ({ ...snakeKeys(done), read_again_at: isoOrNull(done.readAgainAt) });

export const presentDose = (dose: BenchDose) => (dose.way === 'drops' ? { way: dose.way, drops: Object.entries(dose.drops).map(([key, each]) => ({ key, each })), total_drops: dose.totalDrops } : snakeKeys(dose));

/** A changed request as the form would have it; what stays the same on the form is left out. */
function changeOf(request: BenchRequest, form: BenchForm): { bottles: BenchForm['bottles']; priming: BenchForm['priming'] } {
  const { priming } = request;
  return {
    bottles: request.bottles.map((bottle) => ({ key: bottle.key, kind: bottle.choice.kind, closure: bottle.choice.closure, size_ml: bottle.choice.sizeMl, confirmed_bar: bottle.choice.confirmedBar, at_hand: bottle.atHand, drops: priming.way === 'drops' ? (priming.drops[bottle.key] ?? 0) : 0 })),
    priming: priming.way === 'weighed' && form.priming.way === 'weighed' ? { ...form.priming, wanted_volumes: priming.wantedVolumes } : priming.way === 'drops' ? { way: 'drops', grams_each: priming.gramsEach } : { way: 'none' },
  };
}

const presentWay = (way: WayOut, form: BenchForm) => ({ kind: way.kind, title: way.title, sentence: way.sentence, worst_bar: way.worstBar, rated: way.rated, change: way.request && changeOf(way.request, form) });

/** The verdict as it goes over the wire. A stop is presented field by field: nothing of the dose can come along. */
export function presentVerdict(verdict: BenchVerdict, form: BenchForm): BenchVerdictBody {
  const { plan, bottles, residual, remaining, cautions, headline, sentence } = verdict;
  const picture = snakeKeys({ plan, bottles, residual, remaining, cautions, headline, sentence });
  if (verdict.verdict === 'stop') return benchVerdictSchema.parse({ ...picture, verdict: 'stop', problems: verdict.problems, ways: verdict.ways.map((way) => presentWay(way, form)) });
  return benchVerdictSchema.parse({ ...picture, verdict: 'safe', dose: presentDose(verdict.dose), abv_added_percent: verdict.abvAddedPercent });
}
