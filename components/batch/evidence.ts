import type { CallBody } from '@/lib/contracts/assessment';
import type { CallName } from '@/lib/core/types';
import { duration } from '@/components/charts/zone';
import { degrees, gravityText, points } from './figures';

type Evidence = CallBody['evidence'][number];

/** A figure of a call against its limit, as the ruler draws it. */
export interface RulerParts {
  /** Its place in the call's evidence. */
  index: number;
  name: string;
  value: number;
  says: string;
  limit: number;
  limitSays: string;
  good: 'above' | 'below';
  from: number | undefined;
  to: number | undefined;
}

/** A figure with its unit, as it stands in a sentence. */
export function figureWords(value: number, unit: string): string {
  switch (unit) {
    case 'SG':
      return gravityText(value);
    case '°C':
      return degrees(value);
    case 'points':
      return points(value);
    case 'points/d':
      return `${points(value)} a day`;
    case 'h':
      return duration(value * 3600);
    case 'L/h':
      return `${value.toFixed(2)} L/h`;
    case 'volumes':
      return `${value.toFixed(1)} volumes`;
    default:
      return `${Number(value.toFixed(2))} ${unit}`.trim();
  }
}

/** Which side of the limit is good. More is good only where something should move. */
function goodSide(name: CallName, item: Evidence, call: CallBody): 'above' | 'below' {
  if (name === 'stalled' && item.unit === 'points/d') return 'above';
  if (name === 'started') return 'above';
  if (name === 'temperature') return call.kind === 'low' ? 'above' : 'below';
  if (name === 'sensor' && item.name === 'noise of the float') return 'above';
  return 'below';
}

/** The figure that a reader weighs: a pace before a gravity, which the chart shows already. */
function weighed(call: CallBody): number {
  const limited = call.evidence.map((item, index) => ({ item, index })).filter(({ item }) => item.threshold !== null);
  return (limited.find(({ item }) => item.unit !== 'SG') ?? limited[0])?.index ?? -1;
}

/** Ends of a ruler that does not start at nothing. */
function ends(item: Evidence, og: number | null): Pick<RulerParts, 'from' | 'to'> {
  const limit = item.threshold ?? item.value;
  if (item.unit === 'SG') return { from: Math.min(item.value, limit) - 0.01, to: Math.max(og ?? 0, item.value, limit) + 0.004 };
  if (item.unit === '°C') return { from: Math.floor(Math.min(item.value, limit) - 4), to: Math.ceil(Math.max(item.value, limit) + 4) };
  if (item.unit === '%') return { from: 0, to: 100 };
  // A pace below nothing stands at the ruler's end.
  return { from: 0, to: undefined };
}

export function rulerOf(name: CallName, call: CallBody, og: number | null): RulerParts | null {
  const index = weighed(call);
  const item = call.evidence[index];
  if (!item || item.threshold === null) return null;
  const good = goodSide(name, item, call);
  const limit = figureWords(item.threshold, item.unit).replace(' a day', '');
  return {
    index,
    name: item.unit === 'points/d' ? 'fall in a day' : item.name,
    value: item.value,
    says: figureWords(item.value, item.unit).replace(' a day', ''),
    limit: item.threshold,
    limitSays: good === 'above' ? `${limit} needed` : `${limit} at most`,
    good,
    ...ends(item, og),
  };
}

/** The other figures against their limits, in a sentence; null where the ruler says all. */
export function thresholdsOf(call: CallBody, drawn: number | null): string | null {
  const rest = call.evidence.filter((item, index) => item.threshold !== null && index !== drawn);
  if (rest.length === 0) return null;
  const said = rest.map((item) => `${item.name} ${figureWords(item.value, item.unit)}, limit ${figureWords(item.threshold!, item.unit)}`);
  const text = said.join('; ');
  return `${text.charAt(0).toUpperCase()}${text.slice(1)}.`;
}
