'use client';

import { useState } from 'react';
import { typedNumber } from '@/components/batch/figures';
import { Field, Select } from '@/components/ui/Field';
import { UnitField } from '@/components/units/UnitField';
import type { DrinkBody } from '@/lib/contracts/family';
import type { DrinkKind } from '@/lib/core/types';
import { ACIDS, acidDose, tanninDose, USUAL_ACID, USUAL_PH, type Acid } from '@/lib/core/additions/acid';
import { FED_LATELY_MS, NUTRIENTS, nutrientPlan, type Nutrient } from '@/lib/core/additions/nutrients';
import { MOLECULAR_TARGETS, SULPHITE_SALTS, sulphiteDose, type SulphiteSalt } from '@/lib/core/sulphite/dose';
import { Dose, type Told } from './Dose';
import { Sugar } from './Sugar';

const isNumber = (value: number | null | undefined): value is number => typeof value === 'number' && Number.isFinite(value);
const figure = (value: number | null | undefined, digits: number) => (isNumber(value) ? String(Number(value.toFixed(digits))) : '');

const fedLately = (fedAt: string | null, at: string): boolean => fedAt !== null && Date.parse(at) - Date.parse(fedAt) < FED_LATELY_MS;

interface Props {
  batchId: string;
  drink: DrinkBody;
  mayLog: boolean;
}

function Nutrients({ batchId, drink, mayLog }: Props) {
  const [nutrient, setNutrient] = useState<Nutrient>('complex');
  const og = drink.effective_og ?? drink.original_gravity;
  const needed = drink.nitrogen.needed_mg_l;
  const plan =
    og === null || needed === null || drink.expected_final === null
      ? null
      : nutrientPlan({
          volumeL: drink.volume_l,
          neededMgL: needed,
          givenMgL: drink.nitrogen.given_mg_l,
          givenG: nutrient === 'dap' ? drink.nitrogen.given_dap_g : drink.nitrogen.given_complex_g,
          nutrient,
          originalGravity: og,
          gravity: drink.gravity,
          expectedFinal: drink.expected_final.value,
          abvPercent: drink.strength?.balling.value.value ?? 0,
        });
  const due = plan?.portions.find((portion) => portion.state === 'due') ?? null;
  const lately = fedLately(drink.nitrogen.last_fed_at, drink.at);
  const later = plan?.portions.filter((portion) => portion.state === 'later' && portion.grams > 0) ?? [];
  const told: Told | null = plan && {
    says: due ? `Now ${due.grams} g of ${NUTRIENTS[nutrient].name}` : 'Nothing is due now.',
    grams: due?.grams ?? 0,
    substance: 'nutrient',
    name: NUTRIENTS[nutrient].name,
    ingredient: nutrient === 'dap' ? 'dap' : 'complex-nutrient',
    how: plan.totalG.how,
    facts: [
      `${Math.round(100 * plan.sugarUsedShare)} % of the sugar is used. ${plan.missingMgL <= 0 ? 'No nitrogen is missing.' : `${Math.round(plan.missingMgL)} mg/L of the nitrogen that it wants was not given${plan.totalG.value > 0 ? `: ${plan.totalG.value} g in all` : ''}.`}`,
      ...later.map((portion) => `${portion.grams} g at ${portion.atGravity.toFixed(3)}, with ${Math.round(100 * portion.atShare)} % of the sugar gone.`),
    ],
    cautions: plan.cautions,
    none: lately ? 'Fed in the last 12 hours.' : due && due.grams > 0 ? null : plan.missingMgL <= 0 ? 'It has enough nitrogen.' : 'No nutrient now.',
  };
  return (
    <Dose title="Nutrient" batchId={batchId} mayLog={mayLog} told={told} needs={og === null ? 'Log the original gravity first.' : 'The yeast’s need of nitrogen comes with the must sheet; this batch was started without one.'}>
      <Select label="Which" className="col-span-2" value={nutrient} onChange={(event) => setNutrient(event.target.value === 'dap' ? 'dap' : 'complex')}>
        {Object.entries(NUTRIENTS).map(([key, item]) => (
          <option key={key} value={key}>
            {item.name}
          </option>
        ))}
      </Select>
    </Dose>
  );
}

function Sulphite({ batchId, drink, mayLog }: Props) {
  const [ph, setPh] = useState(() => figure(drink.ph?.value, 2));
  const [free, setFree] = useState(() => figure(drink.free_sulphite_mg_l?.value, 0));
  const [celsius, setCelsius] = useState(() => figure(drink.temperature_c, 1));
  const [target, setTarget] = useState<string>(String(MOLECULAR_TARGETS.usual));
  const [salt, setSalt] = useState<SulphiteSalt>('potassium_metabisulphite');
  const [pH, freeMgL, temperature, molecular] = [typedNumber(ph), typedNumber(free), typedNumber(celsius), typedNumber(target)];
  const ready = isNumber(pH) && pH >= 2.5 && pH <= 4.6 && isNumber(temperature) && isNumber(molecular) && molecular > 0 && molecular <= 2 && !(freeMgL !== null && !(freeMgL >= 0));
  const dose = ready
    ? sulphiteDose({ pH, abvPercent: drink.strength?.balling.value.value ?? 0, celsius: temperature, volumeL: drink.volume_l, freeMgL, totalMgL: drink.total_sulphite_mg_l.hi, molecularTarget: molecular, salt })
    : null;
  const told: Told | null = dose && {
    says: `${dose.saltG.value} g of ${SULPHITE_SALTS[salt].name}`,
    grams: dose.saltG.value,
    substance: 'sulphite',
    name: SULPHITE_SALTS[salt].name,
    ingredient: salt === 'sodium_metabisulphite' ? 'sodium-metabisulphite' : 'potassium-metabisulphite',
    how: dose.saltG.how,
    also: [
      { of: 'free needed, and its pK', how: dose.freeNeededMgL.how },
      { of: 'total after it', how: dose.totalAfterMgL.how },
    ],
    facts: [
      `Needs ${Math.round(dose.freeNeededMgL.value)} mg/L free for ${target} mg/L molecular. Total after it: ${Math.ceil(dose.totalAfterMgL.value)} mg/L.`,
      ...(dose.molecularNow.value === null ? [] : [`Molecular now: ${dose.molecularNow.value.toFixed(2)} mg/L.`]),
      ...(dose.tablets > 0 ? [`In tablets: ${dose.tablets}.`] : []),
    ],
    cautions: dose.cautions,
    none: dose.saltG.value > 0 ? null : dose.heldByLimit ? 'No more: the total is at its limit.' : 'None needed.',
  };
  return (
    <Dose title="Sulphite" batchId={batchId} mayLog={mayLog} told={told} needs="Tell the pH, 2.5 to 4.6, and the temperature: how much of it protects depends on both.">
      <Field label="pH" inputMode="decimal" autoComplete="off" value={ph} onChange={(event) => setPh(event.target.value)} />
      <Field label="Free now" unit="mg/L" inputMode="decimal" autoComplete="off" value={free} onChange={(event) => setFree(event.target.value)} hint="Empty: not measured." />
      <UnitField measure="temperature" label="Drink" value={celsius} onChange={(event) => setCelsius(event.target.value)} />
      <Field label="Molecular wanted" unit="mg/L" inputMode="decimal" autoComplete="off" value={target} onChange={(event) => setTarget(event.target.value)} hint={`${MOLECULAR_TARGETS.usual} usual, ${MOLECULAR_TARGETS.secure} secure`} />
      <Select label="Salt" className="col-span-2" value={salt} onChange={(event) => setSalt(event.target.value === 'sodium_metabisulphite' ? 'sodium_metabisulphite' : 'potassium_metabisulphite')}>
        {Object.entries(SULPHITE_SALTS).map(([key, item]) => (
          <option key={key} value={key}>
            {item.name}
          </option>
        ))}
      </Select>
    </Dose>
  );
}

/** As the catalogue has them. */
const ACID_KEYS: Partial<Record<Acid, string>> = { tartaric: 'tartaric-acid', malic: 'malic-acid', citric: 'citric-acid' };

function Acids({ batchId, drink, mayLog, kind }: Props & { kind: DrinkKind }) {
  const usual = kind === 'beer' ? null : USUAL_ACID[kind];
  const [now, setNow] = useState(() => figure(drink.titratable_acid_g_per_l?.value, 1));
  const [wanted, setWanted] = useState('');
  const [acid, setAcid] = useState<Acid>('tartaric');
  const [from, to] = [typedNumber(now), typedNumber(wanted)];
  const ready = isNumber(from) && isNumber(to) && from >= 0 && to >= 0 && from <= 30 && to <= 30;
  const dose = ready ? acidDose(from, to, drink.volume_l, acid) : null;
  const told: Told | null = dose && {
    says: `${dose.grams.value} g of ${dose.of}`,
    grams: dose.grams.value,
    substance: dose.of.startsWith('chalk') ? 'chalk' : 'acid',
    name: dose.of,
    ingredient: dose.of.startsWith('chalk') ? null : (ACID_KEYS[acid] ?? null),
    how: dose.grams.how,
    facts: [`A drink usually stands at pH ${USUAL_PH.lo} to ${USUAL_PH.hi}.${usual ? ` ${kind === 'wine' ? 'Country wine' : kind === 'mead' ? 'Mead' : 'Cider'} usually has ${usual.lo} to ${usual.hi} g/L.` : ''}`],
    cautions: dose.cautions,
    none: dose.grams.value > 0 ? null : 'No acid needed.',
  };
  return (
    <Dose title="Acid" batchId={batchId} mayLog={mayLog} told={told} needs="Tell the titratable acid as measured and as wanted, in g/L as tartaric. Below the measured it reckons chalk.">
      <Field label="Acid now" unit="g/L" inputMode="decimal" autoComplete="off" value={now} onChange={(event) => setNow(event.target.value)} />
      <Field label="Wanted" unit="g/L" inputMode="decimal" autoComplete="off" value={wanted} onChange={(event) => setWanted(event.target.value)} hint={usual ? `usual ${usual.lo} to ${usual.hi}` : undefined} />
      <Select label="With" className="col-span-2" value={acid} onChange={(event) => setAcid((Object.keys(ACIDS) as Acid[]).find((key) => key === event.target.value) ?? 'tartaric')}>
        {Object.entries(ACIDS).map(([key, item]) => (
          <option key={key} value={key}>
            {item.name}
          </option>
        ))}
      </Select>
    </Dose>
  );
}

function Tannin({ batchId, drink, mayLog }: Props) {
  const [rate, setRate] = useState('0.1');
  const gPerL = typedNumber(rate);
  const dose = isNumber(gPerL) && gPerL > 0 && gPerL <= 5 ? tanninDose(gPerL, drink.volume_l) : null;
  const told: Told | null = dose && { says: `${dose.grams.value} g of tannin powder`, grams: dose.grams.value, substance: 'tannin', name: 'grape tannin', ingredient: 'grape-tannin', how: dose.grams.how, facts: [], cautions: dose.cautions, none: dose.grams.value > 0 ? null : 'Less than can be weighed.' };
  return (
    <Dose title="Tannin" batchId={batchId} mayLog={mayLog} told={told} needs="Tell how much, up to 5 g/L.">
      <Field label="Tannin" unit="g/L" inputMode="decimal" autoComplete="off" value={rate} onChange={(event) => setRate(event.target.value)} hint="usual 0.1 to 0.5" />
    </Dose>
  );
}

/** Doses reckoned from what is in the vessel by the log; each is logged with one tap. */
export function Additions({ kind, ...props }: Props & { kind: DrinkKind }) {
  return (
    <>
      <p className="type-reason text-ink2">Your country’s law and the packet go before any figure here.</p>
      <div className="max-w-[760px] wide:grid wide:max-w-none wide:grid-cols-2 wide:gap-x-12">
        <div className="min-w-0">
          <Nutrients {...props} />
          <Sugar {...props} />
          <Tannin {...props} />
        </div>
        <div className="min-w-0">
          <Sulphite {...props} />
          <Acids {...props} kind={kind} />
        </div>
      </div>
    </>
  );
}
