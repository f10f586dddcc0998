import type { Entry } from '@/db/models';
import type { LinkRow } from '@/db/queries/family';
import { POINTS_PER_G_PER_L } from '@/lib/core/gravity/extract';
import { FININGS } from '@/lib/core/additions/fining';
import { catalogued } from '@/lib/core/must/catalogue';
import type { Allergen, Ingredient } from '@/lib/core/must/ingredients';
import { inputsOf } from '@/lib/core/must/line';
import type { MustOutcome } from '@/lib/core/must/sheet';
import { exactly, sum, times, type Range } from '@/lib/core/units/range';
import { outcomeOf, sheetOf } from '../musts/sheet';
import { detailOf, volumeAfter } from './ledger';
import { ingredientNamed, type Stories, type Story } from './load';

/** What is in a drink beside sugar and alcohol, by its whole story. */
export interface Makeup {
  /** All that was ever added and what the must brought, mg/L; what binds and what goes off is not taken off. */
  sulphiteMgL: Range;
  sulphiteAdded: boolean;
  allergens: ReadonlySet<Allergen>;
  diastatic: boolean;
  stabilised: boolean;
  /** Of a sweetener that yeast cannot use, points: from the must sheet, and added since. */
  unfermentable: { must: number; added: number };
  nitrogen: { neededMgL: number | null; givenMgL: number; dapG: number; complexG: number };
  outcome: MustOutcome | null;
}

/** SO2 in potassium metabisulphite, mg in 1 g: what a racking's sulphite is. */
const METABISULPHITE = catalogued('potassium-metabisulphite');

const substance = (entry: Entry) => detailOf(entry).substance ?? null;
const grams = (entry: Entry): number => detailOf(entry).grams ?? 0;

/** Sulphite in one addition, mg. */
function sulphiteOf(entry: Entry, known: Ingredient | undefined): Range {
  if (known && known.sulphiteMgPerG.hi > 0) return times(known.sulphiteMgPerG, grams(entry));
  return substance(entry) === 'sulphite' && METABISULPHITE ? times(METABISULPHITE.sulphiteMgPerG, grams(entry)) : exactly(0);
}

const unfermentableOf = (entry: Entry, known: Ingredient | undefined): number => (known?.kind === 'sweetener' && known.fermentableShare.hi === 0 ? grams(entry) * known.extractShare.lo : 0);

/** Sweetener of the must that no yeast can use, g. */
function sweetenerOf(story: Story): number {
  if (!story.sheet) return 0;
  return sheetOf(story.sheet).lines.reduce((all, line) => {
    if (line.ingredient.kind !== 'sweetener' || line.ingredient.fermentableShare.hi > 0) return all;
    const own = inputsOf(line);
    return all + own.grams.lo * own.extractShare.lo;
  }, 0);
}

/**
 * The make-up of a batch at a time, its sources counted in by their litres. What
 * could hurt is taken together (allergens, yeast that eats on); what makes it
 * safer (stabilised, a sweetener that stays) goes along only with a plain split.
 */
export function makeupOf(stories: Stories, batchId: string, until: Date, seen: ReadonlySet<string> = new Set()): Makeup {
  const story = stories.of.get(batchId);
  const ingredientOf = (entry: Entry) => ingredientNamed(detailOf(entry).ingredient, stories.own);
  const outcome = story?.sheet ? outcomeOf(story.sheet) : null;
  const inflows = stories.links.filter((link) => link.to === batchId && link.at <= until && !seen.has(link.from));
  const parent = inflows.find((link) => link.kind === 'split');
  const sources = inflows.map((link) => ({ link, makeup: makeupOf(stories, link.from, link.at, new Set([...seen, batchId])) }));
  const fromParent = sources.find(({ link }) => link === parent)?.makeup;
  const entries = (story?.entries ?? []).filter((entry) => entry.at <= until);

  // A part of a split keeps its parent's sheet for its name and cost; what the sheet brought comes through the parent.
  const own = parent ? null : outcome;
  let volumeL = entries.find((entry) => entry.kind === 'pitch')?.volumeL ?? story?.batch.volumeL ?? 0;
  const lineOf = (link: LinkRow) => entries.find((entry) => (entry.kind === 'blend' || entry.kind === 'top_up') && detailOf(entry).batch_id === link.from && entry.at.getTime() === link.at.getTime());
  // A batch that began as a blend has no line for what went in: it is what went in.
  const first = sources.filter(({ link }) => link.kind === 'blend' && !lineOf(link));
  const firstL = first.reduce((all, { link }) => all + link.litres, 0);
  let sulphite: Range = first.length > 0 ? sum(first.map(({ link, makeup }) => times(makeup.sulphiteMgL, link.litres / firstL))) : (fromParent?.sulphiteMgL ?? own?.sulphiteMgPerL.value ?? exactly(0));
  for (const entry of entries) {
    const next = volumeAfter(volumeL, entry);
    if (next > volumeL && volumeL > 0 && entry.kind !== 'pitch') sulphite = times(sulphite, volumeL / next);
    const inflow = sources.find(({ link }) => link.kind !== 'split' && lineOf(link) === entry);
    if (inflow && next > 0) sulphite = sum([sulphite, times(inflow.makeup.sulphiteMgL, inflow.link.litres / next)]);
    const added = sulphiteOf(entry, ingredientOf(entry));
    if (next > 0 && added.hi > 0) sulphite = sum([sulphite, times(added, 1 / next)]);
    volumeL = next;
  }
  const litres = Math.max(volumeL, 0.001);
  const allergens = new Set<Allergen>([
    ...(outcome?.allergens ?? []),
    ...sources.flatMap(({ makeup }) => [...makeup.allergens]),
    ...entries.flatMap((entry) => [...(ingredientOf(entry)?.allergens ?? [])]),
    ...(story?.finings ?? []).filter((run) => run.firstAt <= until).flatMap((run) => [...(FININGS.find((fining) => fining.key === run.fining)?.allergens ?? [])]),
  ]);
  const given = entries.reduce((all, entry) => all + (ingredientOf(entry)?.yanMgPerG.value ?? 0) * grams(entry), 0);
  const gramsOfKey = (key: string) => entries.reduce((all, entry) => all + (detailOf(entry).ingredient === key ? grams(entry) : 0), 0);
  const dapOfMust = story?.sheet && !parent ? sheetOf(story.sheet).lines.reduce((all, line) => all + (line.ingredient.key === 'dap' ? inputsOf(line).grams.value : 0), 0) : 0;
  return {
    sulphiteMgL: sulphite,
    sulphiteAdded: sulphite.hi > 0 || sources.some(({ makeup }) => makeup.sulphiteAdded),
    allergens,
    diastatic: Boolean(story?.sheet?.yeast?.diastatic) || sources.some(({ makeup }) => makeup.diastatic),
    stabilised: entries.some((entry) => entry.kind === 'stabilise') || (inflows.length === 1 && (fromParent?.stabilised ?? false)),
    unfermentable: {
      must: parent ? (fromParent?.unfermentable.must ?? 0) : outcome && story ? (POINTS_PER_G_PER_L * sweetenerOf(story)) / outcome.volumeL.value.hi : 0,
      added: entries.reduce((all, entry) => all + (POINTS_PER_G_PER_L * unfermentableOf(entry, ingredientOf(entry))) / litres, 0) + (inflows.length === 1 ? (fromParent?.unfermentable.added ?? 0) : 0),
    },
    nitrogen: {
      neededMgL: own?.nitrogen.neededMgL.value.value ?? fromParent?.nitrogen.neededMgL ?? null,
      givenMgL: (own?.nitrogen.givenMgL.value.value ?? fromParent?.nitrogen.givenMgL ?? 0) + given / litres,
      dapG: gramsOfKey('dap') + dapOfMust,
      complexG: gramsOfKey('complex-nutrient'),
    },
    outcome,
  };
}
