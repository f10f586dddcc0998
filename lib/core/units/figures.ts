const DAY = '(?:Mon|Tue|Wed|Thu|Fri|Sat|Sun)';
const MONTH = '(?:Jan|Feb|Mar|Apr|May|Jun|Jul|Aug|Sep|Oct|Nov|Dec)';
const TIME = '\\d{1,2}:\\d{2}';
const DATE = `\\d{1,2}(?:[–-]\\d{1,2})? ${MONTH}(?:[–-]\\d{1,2} ${MONTH})?(?: \\d{4})?`;
const UNIT = '(?:%|°C|°F|°Bx|°P|gal|L/h|g/L|mg/L|mg|ml|L/d|L|kg|g|h|min|s|days?|weeks?|points?(?:/d| a day)?|volumes?|bar|mm|mV|V|dBm|in \\d+)';
const NUMBER = '\\d+(?:[.,]\\d+)*';
const SIGNED = `(?:[±−+] ?|-)?${NUMBER}(?:[–-]${NUMBER})?(?:[  ]?${UNIT}(?![\\w°]))?(?: ± ${NUMBER})?`;

/**
 * Figures as the log writes them: `1.041`, `15.4 °C`, `4 h 10 min`, `8 in 10`,
 * `14:00`, `Thu 14:00`, `Wed 15 Oct`, `20–22 Oct`. A digit that is part of a
 * word (`N3`, `mead-2b`) is not one.
 */
const FIGURE = new RegExp(
  `(?<![\\w.])(?:(?:${DAY} )?${DATE}(?:,? ${TIME})?|${DAY} ${TIME}|${TIME}|${SIGNED}(?: \\d+ min(?!\\w))?)(?![\\w°])`,
  'g',
);

export interface Piece {
  text: string;
  figure: boolean;
}

/** Splits a sentence into prose and figures, losing nothing: the pieces joined are the sentence. */
export function splitFigures(sentence: string): Piece[] {
  const pieces: Piece[] = [];
  let end = 0;
  for (const match of sentence.matchAll(FIGURE)) {
    if (match.index > end) pieces.push({ text: sentence.slice(end, match.index), figure: false });
    pieces.push({ text: match[0], figure: true });
    end = match.index + match[0].length;
  }
  if (end < sentence.length) pieces.push({ text: sentence.slice(end), figure: false });
  return pieces;
}
