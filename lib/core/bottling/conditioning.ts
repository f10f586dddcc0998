/** Pressure week by week after bottling, and when a lot is ready. */
import { how, type How } from '../how/how';
import { SOURCES } from '../how/sources';
import { VOLUMES_PER_POINT } from '../gas/gas';
import type { Instant } from '../types';
import { roundUp } from '../units/rounding';
import { drinkPressure, type DrinkForGas } from './co2';

const DAY = 86_400_000;
/** Priming sugar: 97 % gone in two weeks at 20 °C, which is what "two weeks warm" means. Our own rule. */
const PRIMING_DAYS = 4;
/** The sugar the yeast left is slower work. Our own rule. */
const LEFTOVER_DAYS = 20;
/** Pace against 20 °C: 2.2 times for 10 °C, as in the fermentation curve. */
const pace = (celsius: number): number => 2.2 ** ((Math.min(30, Math.max(4, celsius)) - 20) / 10);

export interface InBottle {
  /** Gas there already, sugar's gas and what the leftover sugar may give, volumes, upper ends. */
  residualVolumes: number;
  addedVolumes: number;
  remainingPoints: number;
  drink: DrinkForGas;
}

export interface WeekPoint {
  at: Instant;
  /** As asked, bar gauge. */
  bar: number;
  /** If the last sugar ferments too, bar gauge. */
  worstBar: number;
}

const share = (days: number, tau: number, celsius: number): number => 1 - Math.exp((-days * pace(celsius)) / tau);

function pressureAfter(bottle: InBottle, days: number, celsius: number): { bar: number; worstBar: number } {
  const asked = bottle.residualVolumes + bottle.addedVolumes * share(days, PRIMING_DAYS, celsius);
  const worst = asked + VOLUMES_PER_POINT * bottle.remainingPoints * share(days, LEFTOVER_DAYS, celsius);
  const press = (volumes: number): number => Math.max(0, drinkPressure(volumes, celsius, bottle.drink).gaugeBar);
  return { bar: press(asked), worstBar: press(worst) };
}

/** Pressure from the day of bottling on, at one temperature, a point a day. The course in between is a guess; the end is not. */
export function pressureByDay(bottle: InBottle, bottledAt: Instant, celsius: number, days = 56): WeekPoint[] {
  return Array.from({ length: days + 1 }, (_, day) => ({ at: bottledAt + day * DAY, ...pressureAfter(bottle, day, celsius) }));
}

/** How the weeks are reckoned. */
export const howOfWeeks = (bottle: InBottle, celsius: number): How =>
  how('gas there already + that of the sugar for fizz, 97 % gone in two weeks at 20 °C, + that of what may still ferment, slower; each day its pressure as in the table, pace 2.2 times for 10 °C', SOURCES.ownRule, [
    ['there already, at most', bottle.residualVolumes, 'volumes'],
    ['from the sugar, at most', bottle.addedVolumes, 'volumes'],
    ['may still ferment, at most', bottle.remainingPoints, 'points'],
    ['strength, with what the sugar adds', bottle.drink.abvPercent, '% vol'],
    ['stands at', celsius, '°C'],
  ]);

/** The day on which the worst case passes a rating; null where it does not within the days looked at. */
export function overRatingFrom(points: readonly WeekPoint[], ratedBar: number): Instant | null {
  return points.find((p) => p.worstBar > ratedBar)?.at ?? null;
}

/** A bottle is opened to feel its pressure after a week: common practice. */
export const TEST_AFTER_DAYS = 7;

export interface Ready {
  at: Instant;
  days: number;
  how: How;
}

/** Ready to open: two weeks at 20 °C, longer in the cold, at least two weeks; a still drink after one. */
export function readyFrom(bottledAt: Instant, celsius: number, primed: boolean): Ready {
  const days = roundUp(primed ? Math.max(14, 14 / pace(celsius)) : 7, 1);
  return {
    at: bottledAt + days * DAY,
    days,
    how: how('14 days at 20 °C, slower in the cold by 2.2 times for 10 °C, never less', SOURCES.practice, [
      ['stands at', celsius, '°C'],
      ['primed', primed ? 'yes' : 'no', ''],
    ]),
  };
}
