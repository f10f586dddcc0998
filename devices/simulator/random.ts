/** A repeatable source of numbers in [0, 1). */
export type Uniform = () => number;

/** FNV-1a, 32 bit, of a text: turns a seed and a purpose into a starting state. */
function hash(text: string): number {
  let value = 0x811c9dc5;
  for (let index = 0; index < text.length; index += 1) {
    value = Math.imul(value ^ text.charCodeAt(index), 0x01000193);
  }
  return value >>> 0;
}

/**
 * One stream of numbers for one purpose, so that drawing more for one trait of a
 * sensor never moves another. Generator: mulberry32 (T. Ettinger, public domain).
 */
export function stream(seed: number, purpose: string): Uniform {
  let state = hash(`${seed}/${purpose}`);
  return () => {
    state = (state + 0x6d2b79f5) | 0;
    let mixed = Math.imul(state ^ (state >>> 15), 1 | state);
    mixed = (mixed + Math.imul(mixed ^ (mixed >>> 7), 61 | mixed)) ^ mixed;
    return ((mixed ^ (mixed >>> 14)) >>> 0) / 4_294_967_296;
  };
}

/** A draw from the standard normal distribution (Box and Muller 1958); always takes two numbers. */
export function normal(uniform: Uniform): number {
  const radius = Math.sqrt(-2 * Math.log(1 - uniform()));
  return radius * Math.cos(2 * Math.PI * uniform());
}

/** A draw between two limits. */
export const between = (uniform: Uniform, low: number, high: number): number => low + (high - low) * uniform();
