'use client';

import { points, typedGravity, typedNumber } from '@/components/batch/figures';
import { Box } from '@/components/ui/Box';
import { LinkButton } from '@/components/ui/Button';
import { Choice } from '@/components/ui/Choice';
import { Field } from '@/components/ui/Field';
import { How } from '@/components/ui/How';
import { Sentence } from '@/components/ui/Sentence';
import { gravityName, gravityText, hydrometerMarks } from '@/components/ui/units';
import { UnitField } from '@/components/units/UnitField';
import { State } from '@/components/ui/StateMark';
import { camelKeys } from '@/lib/contracts/case';
import type { MustBody } from '@/lib/contracts/musts';
import { gapOf, measuredOriginal, type Measurement } from '@/lib/core/must/original-gravity';
import { pitchChecklist, sulphited } from '@/lib/core/must/pitch';
import type { Range } from '@/lib/core/units/range';
import { useKept } from '@/components/ui/use-kept';
import { ends } from './words';

const isNumber = (value: number | null): value is number => value !== null && Number.isFinite(value);

function measurementOf(instrument: Measurement['with'], reading: string, sample: string, calibration: string): Measurement | null {
  const sampleC = typedNumber(sample);
  if (instrument === 'hydrometer') {
    const shown = typedGravity(reading);
    const calibrationC = typedNumber(calibration);
    return isNumber(shown) && shown >= 0.97 && shown <= 1.2 && isNumber(sampleC) && isNumber(calibrationC) && calibrationC >= 0 && calibrationC <= 40 ? { with: 'hydrometer', reading: shown, sampleC, calibrationC } : null;
  }
  const brix = typedNumber(reading);
  return isNumber(brix) && brix >= 0 && brix <= 45 && !Number.isNaN(sampleC) ? { with: 'refractometer', brix, sampleC } : null;
}

/** A figure more than the log writes, as a hydrometer for the original gravity is read; whoever reads °Bx or °P has theirs. */
const finely = (sg: number): string => (gravityName() === '' ? sg.toFixed(4) : gravityText(sg));

const GAP_WORDS = { as_expected: 'As the sheet promised', lower: 'Lower than promised', higher: 'Higher than promised' } as const;

function Gap({ expected, measured }: { expected: Range; measured: Range }) {
  const gap = gapOf(expected, measured);
  return (
    <div className="mt-2">
      <State state={gap.verdict === 'as_expected' ? 'Ready' : 'Check'} word={GAP_WORDS[gap.verdict]} />
      <p className="type-body mt-1">
        <Sentence>{`Promised ${ends(expected, 3)}; ${points(gap.points)} from the middle of it.`}</Sentence>
      </p>
      {gap.causes.length > 0 && (
        <ul className="mt-1 list-disc pl-5">
          {gap.causes.map((cause) => (
            <li key={cause} className="type-reason">
              <Sentence>{cause}</Sentence>
            </li>
          ))}
        </ul>
      )}
    </div>
  );
}

interface Typed {
  instrument: Measurement['with'];
  reading: string;
  sample: string;
  calibration: string;
  mustC: string;
  dry: string;
  ticked: readonly string[];
}

/** The original gravity as measured, against what was promised; then the pitch, step by step. */
export function Measured({ must, keptAs, mayStart }: { must: MustBody; keptAs: string; mayStart: boolean }) {
  // Kept in the tab: between the hydrometer and the kettle the page is closed more than once.
  const [typed, setTyped] = useKept<Typed>(keptAs, () => ({ instrument: 'hydrometer', reading: '', sample: '20', calibration: '20', mustC: '', dry: '', ticked: [] }));
  const { instrument, reading, sample, calibration, mustC, dry } = typed;
  const set = (field: 'reading' | 'sample' | 'calibration' | 'mustC' | 'dry') => (event: { target: { value: string } }) => setTyped({ ...typed, [field]: event.target.value });
  const ticked = new Set(typed.ticked);
  const measurement = measurementOf(instrument, reading, sample, calibration);
  const measured = measurement && measuredOriginal(measurement);
  const expected = must.result.ok ? must.result.outcome.gravity_at_pitch.value : null;
  const temperature = typedNumber(mustC);
  const grams = typedNumber(dry);
  const check = pitchChecklist({ yeast: must.sheet.yeast && camelKeys(must.sheet.yeast), dryYeastG: isNumber(grams) && grams > 0 ? grams : null, mustC: isNumber(temperature) ? temperature : null, glass: true, sulphited: sulphited(must.sheet.lines) });

  const waits = check.steps.some((step) => step.key === 'sulphite' && !ticked.has(step.key));

  return (
    <div className="flex flex-col gap-6">
      <section aria-labelledby="measured" className="flex flex-col gap-3">
        <h3 id="measured" className="type-verdict-now">
          Original gravity
        </h3>
        <Choice label="Read with" bare value={instrument} onChoose={(next) => setTyped({ ...typed, instrument: next })} options={[{ value: 'hydrometer', name: 'Hydrometer' }, { value: 'refractometer', name: 'Refractometer' }]} />
        {instrument === 'hydrometer' ? (
          <UnitField measure="gravity" label="Gravity as read" placeholder="1.062" value={reading} onChange={set('reading')} />
        ) : (
          <Field label="As read" unit="°Bx" inputMode="decimal" autoComplete="off" placeholder="15.2" value={reading} onChange={set('reading')} />
        )}
        <div className="grid grid-cols-2 gap-3">
          <UnitField measure="temperature" label="Sample" value={sample} onChange={set('sample')} hint={instrument === 'refractometer' ? 'Empty: it corrects itself.' : undefined} />
          {instrument === 'hydrometer' && <UnitField measure="temperature" label="Hydrometer made for" value={calibration} onChange={set('calibration')} hint={`${hydrometerMarks().join(', or ')} on older ones.`} />}
        </div>
        <div aria-live="polite">
          {measured && !measured.ok && <p className="type-body border-l-[3px] border-madder pl-3"><Sentence>{measured.sentence}</Sentence></p>}
          {measured?.ok && (
            <>
              <p className="type-verdict-now">
                <Sentence strong>{`At 20 °C it is ${finely(measured.gravity.value.value)}`}</Sentence> <span className="type-label text-ink2">{`${finely(measured.gravity.value.lo)} to ${finely(measured.gravity.value.hi)}`}</span>
              </p>
              <How how={measured.gravity.how} of="the corrected gravity" />
              {expected && <Gap expected={expected} measured={measured.gravity.value} />}
            </>
          )}
        </div>
      </section>
      <section aria-labelledby="pitch" className="flex flex-col gap-3 border-t-[1.5px] border-ink pt-4">
        <h3 id="pitch" className="type-verdict-now">
          Pitch, step by step
        </h3>
        <div className="grid grid-cols-2 gap-3">
          <UnitField measure="temperature" label="Must now" value={mustC} onChange={set('mustC')} />
          <Field label="Dry yeast" unit="g" inputMode="decimal" autoComplete="off" value={dry} onChange={set('dry')} />
        </div>
        <div aria-live="assertive">
          {check.stops.map((stop) => (
            <p key={stop} className="type-body flex items-start gap-2 border-l-[3px] border-madder bg-lit py-2 pl-3">
              <State state="Stop" size={15} />
              <span><Sentence>{stop}</Sentence></span>
            </p>
          ))}
        </div>
        <ol className="flex flex-col">
          {check.steps.map((step) => (
            <li key={step.key} className="border-b border-rule py-2">
              <Box ticked={ticked.has(step.key)} notYet={step.key === 'pitch' && (check.stops.length > 0 || waits)} onTick={(on) => setTyped({ ...typed, ticked: on ? [...typed.ticked, step.key] : typed.ticked.filter((key) => key !== step.key) })}>
                <span className="type-body">
                  <Sentence>{step.sentence}</Sentence>
                  {step.caution && <span className="type-reason block text-ink2"><Sentence>{step.caution}</Sentence></span>}
                </span>
              </Box>
            </li>
          ))}
        </ol>
        <How how={check.how} of="the checklist" />
        {mayStart && measured?.ok && (
          <LinkButton look="first" className="self-end" href={`/batches/new?must=${must.id}&version=${must.version}&og=${measured.gravity.value.value.toFixed(4)}`}>
            Start a batch with it
          </LinkButton>
        )}
      </section>
    </div>
  );
}
