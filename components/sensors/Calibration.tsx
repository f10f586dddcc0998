'use client';

import { useState } from 'react';
import { dayName } from '@/components/charts/zone';
import { Haze } from '@/components/ui/Haze';
import { ErrorState, FormError } from '@/components/ui/Notice';
import { GroupBar } from '@/components/ui/Page';
import { Sentence } from '@/components/ui/Sentence';
import { State } from '@/components/ui/StateMark';
import type { CalibrationBody } from '@/lib/contracts/calibration';
import type { SensorBody } from '@/lib/contracts/sensors';
import { removePoint, useCalibration } from '@/lib/client/calibration';
import { fitCalibration, type Degree, type FitOutcome } from '@/lib/core/calibration/calibrate';
import { CalibrationChart } from './CalibrationChart';
import { CalibrationPoints, type ChosenPoint } from './CalibrationPoints';
import { Candidates } from './Candidates';
import { CURVE_WORDS } from './words';
import { KeepFit } from './KeepFit';
import { OwnOffset, Suggested } from './OffsetPanel';
import { PointForm } from './PointForm';
import { useAct } from '@/components/ui/use-act';
import { Versions } from './Versions';

/** Half widths above this ask for more points, SG: two points, as far as a hydrometer can be read. */
const TRUSTED = 0.002;

function Verdict({ outcome }: { outcome: FitOutcome }) {
  if (!outcome.ok) {
    return (
      <>
        <State state="Check" word="No curve" />
        <p className="type-verdict-now">
          <Sentence strong>{outcome.reason}</Sentence>
        </p>
      </>
    );
  }
  const { fit } = outcome;
  const right = (fit.rightTo * 1000).toFixed(1);
  const trusted = fit.rightTo <= TRUSTED;
  return (
    <>
      <State state={trusted ? 'Ready' : 'Check'} word={trusted ? 'Trusted' : 'Rough'} />
      <p className="type-verdict-top">
        <Sentence strong>{`Right to ${right} points anywhere from ${fit.gravityLow.toFixed(3)} to ${fit.gravityHigh.toFixed(3)}`}</Sentence>
      </p>
      <p className="type-body text-ink2">
        <Sentence>{`19 in 20, from ${fit.points.length} liquids of known gravity, on ${CURVE_WORDS[fit.degree]}. ${trusted ? 'A reading by hand more than 2 points off would ask for a new fit.' : 'More points, spread evenly, make it surer.'}`}</Sentence>
      </p>
    </>
  );
}

function Bench({ sensor, calibration, mayChange, timeZone, now }: { sensor: SensorBody; calibration: CalibrationBody; mayChange: boolean; timeZone: string; now: number }) {
  const [chosen, setDegree] = useState<Degree | null>(null);
  // Four points show a bend; fewer only where the line goes.
  const degree = chosen ?? (calibration.points.length >= 4 ? 2 : 1);
  const [corrects, setCorrects] = useState(true);
  const [left, setLeft] = useState<ReadonlySet<string>>(new Set());
  const { failed, act } = useAct();
  const points: ChosenPoint[] = calibration.points.map((point) => ({ ...point, used: !left.has(point.id) }));
  const used = points.filter((point) => point.used);
  // The core itself, in the browser: what is seen here is what is kept.
  const outcome = fitCalibration(used, degree, corrects);
  const use = (id: string, ticked: boolean) =>
    setLeft((before) => {
      const next = new Set(before);
      if (ticked) next.delete(id);
      else next.add(id);
      return next;
    });
  return (
    <>
      {failed && <FormError>{failed}</FormError>}
      {points.length > 0 && (
        <div className="border-b px-(--margin) pb-2 pt-4">
          <CalibrationChart points={points} fit={outcome.ok ? outcome.fit : null} correctsTemperature={corrects} />
        </div>
      )}
      <div className="border-b bg-lit px-(--margin) py-4">
        {points.length === 0 ? (
          <>
            <p className="type-verdict-now">No points yet</p>
            <p className="type-body max-w-[62ch] text-ink2">Float it in water, then in sugar water of three strengths or more up to the strongest must you make; note each with the angle it leans at. Readings by hand from the log can stand in for any of them.</p>
          </>
        ) : (
          <Verdict outcome={outcome} />
        )}
      </div>
      {points.length > 0 && <CalibrationPoints points={points} fit={outcome.ok ? outcome.fit : null} mayChange={mayChange} onUse={use} onRemove={(id) => void act(() => removePoint(sensor.id, id))} />}
      {points.length > 0 && (
        <p className="type-reason border-b px-(--margin) py-2 text-ink2">
          In points of gravity. Left over: how far the point lies from the curve. Without it: how far it would lie from a curve drawn by the others alone.
        </p>
      )}
      {mayChange && (
        <>
          <KeepFit sensor={sensor.id} points={used.map((point) => point.id)} outcome={outcome} degree={degree} onDegree={setDegree} corrects={corrects} onCorrects={setCorrects} calibration={calibration} timeZone={timeZone} now={now} />
          <GroupBar word="Add a point" />
          <PointForm sensor={sensor.id} last={calibration.last} />
          <Candidates sensor={sensor.id} candidates={calibration.candidates} timeZone={timeZone} />
        </>
      )}
    </>
  );
}

/** Gravity from the angle at which a float leans, or an offset on the gravity that it sends. */
export function Calibration({ sensor, mayChange, now, timeZone }: { sensor: SensorBody; mayChange: boolean; now: number; timeZone: string }) {
  const { data: calibration, error, loading, retry } = useCalibration(sensor.id);
  if (loading) return <Haze height={180} label="Loading the calibration" className="mx-(--margin) my-3" />;
  if (!calibration) {
    return (
      <ErrorState title="The calibration did not load" onRetry={retry}>
        {error?.message}
      </ErrorState>
    );
  }
  const leans = calibration.last !== null || calibration.points.length > 0;
  const inForce = sensor.calibration && `version ${sensor.calibration.version} since ${dayName(Date.parse(sensor.calibration.applies_from) / 1000, timeZone)}`;
  return (
    <section aria-label="Calibration">
      <GroupBar word="Calibration" note={[inForce ?? 'none in force', ...(calibration.turning ? ['readings are being turned'] : []), ...(calibration.waiting > 0 ? [`${calibration.waiting} ${calibration.waiting === 1 ? 'reading waits' : 'readings wait'}`] : [])].join(' · ')} />
      {/* While readings are turned it still speaks of them as they were: agreed to again, it would move them twice. */}
      {calibration.suggestion && !calibration.turning && <Suggested sensor={sensor.id} suggestion={calibration.suggestion} mayChange={mayChange} timeZone={timeZone} />}
      {leans ? (
        <Bench sensor={sensor} calibration={calibration} mayChange={mayChange} timeZone={timeZone} now={now} />
      ) : (
        <p className="type-body border-b px-(--margin) py-3 text-ink2">It sends gravity itself, so no curve is needed. Should it send its inclination, the bench for a curve stands here.</p>
      )}
      {mayChange && <OwnOffset sensor={sensor.id} timeZone={timeZone} now={now} />}
      <Versions sensor={sensor.id} versions={calibration.versions} mayChange={mayChange} timeZone={timeZone} />
    </section>
  );
}
