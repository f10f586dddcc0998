import type { RuleName } from './rules';

/** What to do first where the call itself does not say, and what can hurt while doing it. */
export interface Advice {
  first: string;
  caution: string | null;
  /** Where the caution comes from. */
  source: string | null;
}

const PRACTICE = 'common practice';

/**
 * Advice that goes with an alert, rounded to the safe side. Local law and
 * licensed practice come before any of it.
 */
export const ADVICE: Readonly<Record<RuleName, Advice>> = {
  overdue: {
    first: 'Take a hydrometer reading, and look for foam or a ring at the glass. No fall and no foam: check the temperature first, then think of pitching again.',
    caution: null,
    source: null,
  },
  foam: {
    first: 'Fit a blow-off tube that ends under water in an open jar, and wipe the neck.',
    caution: 'A blocked airlock puts the glass under pressure. Ease it off slowly, with your face turned away, and never close a vessel while it works.',
    source: PRACTICE,
  },
  neck: {
    first: 'Fill an airlock, pull the tube, fit the airlock, and log the change.',
    caution: 'An airlock lets gas out; a plain bung does not. Never close a vessel while it works.',
    source: PRACTICE,
  },
  stalled: {
    first: 'Take a hydrometer reading before anything else: the sensor may be the one that has stopped. If it agrees, bring the vessel back into its range slowly and rouse it gently.',
    caution: 'Do not bottle it: what sugar is left can ferment in the bottle. No hot liquid into cold glass; lift a full vessel with both hands.',
    source: PRACTICE,
  },
  temperature: {
    first: 'Move the vessel or change the room, a few degrees a day at most, and look again in some hours.',
    caution: 'No hot water on cold glass; lift a full vessel with both hands.',
    source: PRACTICE,
  },
  sensor: {
    first: 'Look at the vessel yourself, take a hydrometer reading, and check the sensor’s battery and where it floats.',
    caution: null,
    source: null,
  },
  rack: {
    first: 'Take a hydrometer reading, then siphon off the lees into a clean vessel with little headspace.',
    caution: 'Carbon dioxide collects low: air the room while you work (8 h workplace limit 0.5 %). Lift a full vessel with both hands.',
    source: 'UK HSE, EH40/2005 workplace exposure limits; common practice',
  },
  bottle: {
    first: 'Take two hydrometer readings two days apart. If they are equal, work out the sugar for the sparkle you want before you wash a bottle.',
    caution: 'A bottle can burst: use bottles made for the pressure, weigh the priming sugar, wear gloves and eye protection. The law where you live comes first: drink made at home is generally not for sale without a licence, and has an age limit.',
    source: 'common practice; UK Notice 162 section 1.2 for sale without approval',
  },
  refermentation: {
    first: 'Do not bottle. If some of it is in bottles already, put them in the cold, away from people, and read this before you touch them.',
    caution: 'Bottles may be over pressure. Gloves, long sleeves and eye protection; do not shake or carry one that bulges; chill them for a day, then let the gas out little by little under a cloth.',
    source: PRACTICE,
  },
};
