import bidiFactory from 'bidi-js';

const bidi = bidiFactory();

/** Letters that run one way. */
export interface Stretch {
  /** In the order they are read; a face that shapes them turns them itself. */
  text: string;
  leftwards: boolean;
}

/** Scripts that run leftwards, and the signs that turn a line. */
const MAY_TURN = /[\u0590-\u08ff\u200e\u200f\u202a-\u202e\u2066-\u2069\ufb1d-\ufdff\ufe70-\ufefc]|[\u{10800}-\u{10fff}\u{1e800}-\u{1efff}]/u;

/** A line as it stands from left to right: stretches of one direction, put in order (Unicode Bidirectional Algorithm, rule L2). */
export function inOrder(line: string): Stretch[] {
  if (!MAY_TURN.test(line)) return [{ text: line, leftwards: false }];
  const { levels } = bidi.getEmbeddingLevels(line);
  const stretches: Array<Stretch & { level: number }> = [];
  let index = 0;
  for (const letter of line) {
    const level = levels[index] ?? 0;
    index += letter.length;
    const leftwards = level % 2 === 1;
    const set = leftwards ? (bidi.getMirroredCharacter(letter) ?? letter) : letter;
    const last = stretches.at(-1);
    if (last?.level === level) last.text += set;
    else stretches.push({ text: set, leftwards, level });
  }
  const highest = Math.max(0, ...stretches.map((stretch) => stretch.level));
  for (let level = highest; level > 0; level -= 1) turn(stretches, level);
  return stretches.map(({ text, leftwards }) => ({ text, leftwards }));
}

/** Turns every sequence that stands at a level or above. */
function turn(stretches: Array<Stretch & { level: number }>, level: number): void {
  for (let from = 0; from < stretches.length; from += 1) {
    if (stretches[from]!.level < level) continue;
    let to = from;
    while (to + 1 < stretches.length && stretches[to + 1]!.level >= level) to += 1;
    stretches.splice(from, to - from + 1, ...stretches.slice(from, to + 1).toReversed());
    from = to;
  }
}
