/** When a batch is to be fed, by the sugar it has used. */
import { FED_LATELY_MS, NUTRIENTS, nutrientPlan, type NutrientInput } from '../additions/nutrients';
import type { Instant, Stage } from '../types';

/** Below this much of what it needs nobody is sent to the cellar. Our own rule. */
const WORTH_A_WALK = 0.1;
const AT_WORK: readonly Stage[] = ['accelerating', 'peak', 'slowing'];

export interface FeedInput extends Omit<NutrientInput, 'nutrient'> {
  stage: Stage;
  /** Last time nutrient went in. */
  fedAt: Instant | null;
  at: Instant;
}

export interface Feed {
  /** Which portion of the plan, counted from 1. */
  portion: number;
  grams: number;
  of: string;
  /** Why, in sentences. */
  note: string;
}

/** The portion of complex nutrient that is due; null while none is. See {@link nutrientPlan} for the rule and its sources. */
export function feedDue({ stage, fedAt, at, ...input }: FeedInput): Feed | null {
  if (!AT_WORK.includes(stage) || input.gravity === null) return null;
  if (fedAt !== null && at - fedAt < FED_LATELY_MS) return null;
  const plan = nutrientPlan({ ...input, nutrient: 'complex' });
  if (plan.missingMgL < WORTH_A_WALK * input.neededMgL) return null;
  const index = plan.portions.findIndex((portion) => portion.state === 'due');
  const due = plan.portions[index];
  if (!due || !(due.grams > 0)) return null;
  const used = `${Math.round(100 * plan.sugarUsedShare)} % of its sugar is used; ${Math.round(plan.missingMgL)} mg/L of nitrogen is missing.`;
  return { portion: index + 1, grams: due.grams, of: NUTRIENTS.complex.name, note: [used, plan.cautions[0]].filter(Boolean).join(' ') };
}
