import type { Span } from './picture';
import { clock, instantOf, MONTHS, wallTime } from './zone';

/** One day of the calendar; a day with a change of clocks has 23 or 25 hours. */
export interface Day extends Span {
  /** `M`, `T` … */
  letter: string;
  /** `Mon`, `Tue` … */
  weekday: string;
  date: number;
  /** `Oct` */
  month: string;
  weekend: boolean;
}

/** The days that touch a span, whole, ascending. */
export function daysOf(span: Span, timeZone: string): Day[] {
  const days: Day[] = [];
  const first = wallTime(span.from, timeZone);
  for (let step = 0; step < 4000; step++) {
    // Date.UTC carries a day past the month's end into the next month.
    const noon = new Date(Date.UTC(first.year, first.month - 1, first.day + step, 12));
    const parts = { year: noon.getUTCFullYear(), month: noon.getUTCMonth() + 1, day: noon.getUTCDate() };
    const from = instantOf(parts, timeZone);
    if (from >= span.to) break;
    const next = new Date(noon.getTime() + 86_400_000);
    const to = instantOf({ year: next.getUTCFullYear(), month: next.getUTCMonth() + 1, day: next.getUTCDate() }, timeZone);
    const weekday = ['Sun', 'Mon', 'Tue', 'Wed', 'Thu', 'Fri', 'Sat'][noon.getUTCDay()]!;
    days.push({ from, to, letter: weekday[0]!, weekday, date: parts.day, month: MONTHS[parts.month - 1]!, weekend: weekday === 'Sat' || weekday === 'Sun' });
  }
  return days;
}

/** A label of the calendar axis: two short lines over a stretch of time. */
export interface AxisLabel extends Span {
  top: string;
  bottom: string;
  strong: boolean;
  /** The stretch that holds now. */
  today: boolean;
  /** An hour names its rule; a day, week or month names the room between two. */
  names: 'rule' | 'room';
}

export interface Calendar {
  labels: AxisLabel[];
  /** Where a rule is drawn. */
  rules: number[];
  weekends: Span[];
}

const HOUR_STEPS = [1, 2, 3, 6, 12];

function hourLabels(days: readonly Day[], step: number, timeZone: string, now: number): AxisLabel[] {
  return days.flatMap((day) => {
    const wall = wallTime(day.from, timeZone);
    const starts = Array.from({ length: 24 / step }, (_, index) => (index === 0 ? day.from : instantOf({ year: wall.year, month: wall.month, day: wall.day, hour: index * step }, timeZone)));
    return starts.map((from, index) => {
      const to = starts[index + 1] ?? day.to;
      return { from, to, top: index === 0 ? `${day.weekday} ${day.date}` : '', bottom: clock(from, timeZone), strong: index === 0, today: from <= now && now < to, names: 'rule' };
    });
  });
}

function groupLabels(days: readonly Day[], now: number, startsGroup: (day: Day) => boolean, words: (day: Day) => { top: string; bottom: string }): AxisLabel[] {
  const groups: AxisLabel[] = [];
  for (const day of days) {
    const last = groups[groups.length - 1];
    if (last && !startsGroup(day)) last.to = day.to;
    else groups.push({ from: day.from, to: day.to, ...words(day), strong: false, today: false, names: 'room' });
  }
  return groups.map((group) => ({ ...group, today: group.from <= now && now < group.to }));
}

/**
 * Rules and labels for a span drawn on `width` pixels: hours when zoomed in,
 * days as a rule, weeks or months for long batches.
 */
export function calendarOf(span: Span, timeZone: string, width: number, now: number, narrow = false): Calendar {
  const days = daysOf(span, timeZone);
  const weekends = days.filter((day) => day.weekend).map(({ from, to }) => ({ from, to }));
  const perDay = (width * 86_400) / Math.max(1, span.to - span.from);
  const roomy = narrow ? 20 : 27;

  const step = HOUR_STEPS.find((hours) => (perDay * hours) / 24 >= 44);
  if (step !== undefined && perDay >= 44 * 4) {
    const labels = hourLabels(days, step, timeZone, now).filter((label) => label.to > span.from && label.from < span.to);
    // Where no midnight is in sight the first whole hour names the day.
    const seen = labels.filter((label) => label.from >= span.from);
    const first = seen[1] ?? seen[0];
    const day = first && days.find((item) => item.from <= first.from && first.from < item.to);
    if (first && day && !seen.some((label) => label.top !== '')) first.top = `${day.weekday} ${day.date}`;
    return { labels, rules: labels.map((label) => label.from), weekends };
  }
  if (perDay >= roomy) {
    const labels = days.map((day) => ({
      from: day.from,
      to: day.to,
      // The first of a month says which, in the line that has room for it.
      top: day.date === 1 && perDay < 56 ? day.month : perDay >= 34 ? day.weekday : day.letter,
      bottom: day.date === 1 && perDay >= 56 ? `1 ${day.month}` : String(day.date),
      strong: day.weekend || day.date === 1,
      today: day.from <= now && now < day.to,
      names: 'room' as const,
    }));
    return { labels, rules: days.map((day) => day.from), weekends };
  }
  const weekly = perDay * 7 >= 44;
  const labels = weekly
    ? groupLabels(days, now, (day) => day.weekday === 'Mon', (day) => ({ top: day.month, bottom: String(day.date) }))
    : groupLabels(days, now, (day) => day.date === 1, (day) => ({ top: day.month, bottom: day.month === 'Jan' ? String(wallTime(day.from, timeZone).year) : '' }));
  const rules = labels.map((label) => label.from);
  // A week or month of which the span holds only an end has no room for its name.
  const least = weekly ? 3.2 * 86_400 : 13 * 86_400;
  return { labels: labels.filter((label) => label.today || label.to - label.from >= least), rules, weekends: weekly ? weekends : [] };
}
