import type { How as HowAnswer } from '@/lib/core/how/how';
import { Sentence } from './Sentence';
import { gravityText, temperatureText, volumeText } from './units';

/** How far a source may be trusted, as the reader is told. */
const STATUS_WORDS: Record<HowAnswer['status'], string> = {
  published: 'published',
  'common practice': 'common practice',
  'our own rule': 'a rule of this program',
  'from memory': 'recalled, not checked',
  told: 'told by you',
};

const plain = (value: number): string => String(Number(value.toPrecision(6))).replace('-', '−');
/** Units that a person may read otherwise, or that have their own number of places. */
const READ: Record<string, (value: number) => string> = { SG: (sg) => gravityText(sg), '°C': (celsius) => temperatureText(celsius), L: (litres) => volumeText(litres, 2), '% vol': (share) => `${share.toFixed(2)} % vol` };

/** An input with its unit, as the person reads it; a span of figures figure by figure. */
function inputText(value: number | string | null, unit: string): string {
  if (value === null) return 'not told';
  const read = READ[unit];
  if (typeof value === 'number') return read ? read(value) : `${plain(value)} ${unit}`.trim();
  return read ? value.replace(/-?\d+(?:\.\d+)?/g, (figure) => read(Number(figure))) : `${value} ${unit}`.trim();
}

/** The answer itself: formula, inputs, source. */
export function HowBody({ how }: { how: HowAnswer }) {
  return (
    <div className="mb-2 border-l-[3px] border-rule2 pl-3">
      <p className="type-reason">
        <Sentence>{how.formula}</Sentence>
      </p>
      {how.inputs.length > 0 && (
        <dl className="type-label my-1 grid grid-cols-[auto_minmax(0,1fr)] gap-x-3 text-ink2">
          {how.inputs.map((input) => (
            <div key={input.name} className="contents">
              <dt>{input.name}</dt>
              <dd className="break-words text-ink">
                {inputText(input.value, input.unit)}
              </dd>
            </div>
          ))}
        </dl>
      )}
      <p className="type-tick text-ink2">
        {STATUS_WORDS[how.status]}: {how.source}
      </p>
    </div>
  );
}

/** The question as it looks: low in its row, with a finger's room around it on a phone, but none to the right, where the screen ends. */
export const HOW_LINK = "type-tick not-printed relative inline-flex min-h-6 items-center underline underline-offset-2 hover:text-ink max-strip:after:absolute max-strip:after:-left-2.5 max-strip:after:right-0 max-strip:after:-inset-y-2.5 max-strip:after:content-['']";

/** Every figure can be asked "how?": its formula, what went into it, and where the formula is from. */
export function How({ how, of, named = false, className = '' }: { how: HowAnswer; /** Which figure, for those who hear the page. */ of: string; /** Said on the screen too, where several stand together. */ named?: boolean; className?: string }) {
  return (
    <details className={`group/how not-printed min-w-0 ${className}`}>
      <summary className={`${HOW_LINK} cursor-pointer list-none text-ink2 decoration-rule2 [&::-webkit-details-marker]:hidden`}>
        how?{named ? ` ${of}` : <span className="heard-only"> {of}</span>}
      </summary>
      <HowBody how={how} />
    </details>
  );
}
