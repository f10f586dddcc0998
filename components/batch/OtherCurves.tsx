'use client';

import { Button } from '@/components/ui/Button';
import { Choice } from '@/components/ui/Choice';
import { Sentence } from '@/components/ui/Sentence';
import { OTHER_CURVES, type OtherCurve } from '@/lib/core/fit/other';
import { CURVE_NAMES } from './other-curve';

interface OtherCurvesProps {
  chosen: OtherCurve;
  words: string;
  onChoose: (curve: OtherCurve) => void;
  onClose: () => void;
}

/** A curve of the textbooks over the same readings, and why it is not the one in use. */
export function OtherCurves({ chosen, words, onChoose, onClose }: OtherCurvesProps) {
  return (
    <section
      aria-label="Another curve"
      className="border-b border-dashed bg-desk px-(--margin) pb-4 pt-3"
      onKeyDown={(event) => {
        if (event.key === 'Escape') onClose();
      }}
    >
      <div className="flex flex-wrap items-center gap-x-4 gap-y-1">
        <h3 className="type-name">Another curve</h3>
        <p className="type-label text-ink2">Over the same readings. The calls do not use it.</p>
        <Button size="lane" look="quiet" className="ml-auto" onClick={onClose}>
          Close (Esc)
        </Button>
      </div>
      <Choice bare className="mt-3 max-w-[640px]" label="Curve" value={chosen} onChoose={onChoose} options={OTHER_CURVES.map((value) => ({ value, name: CURVE_NAMES[value] }))} />
      <p aria-live="polite" className="type-body mt-3 max-w-[74ch]">
        <Sentence>{words}</Sentence>
      </p>
      <p className="type-label mt-2 max-w-[80ch] text-ink2">
        Speers, Rogers and Smith 2003 (logistic); Zwietering et al. 1990 (Gompertz, Richards); AIC for small samples after Burnham and Anderson 2002. Plain least squares on the clock; the curve in use runs on thermal time with what is known of the yeast.
      </p>
    </section>
  );
}
