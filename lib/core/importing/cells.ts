/** A spreadsheet takes a cell that begins so for a formula (OWASP, CSV Injection), quotes before it notwithstanding. */
const FORMULA = /^'*[=+\-@\t\r]/;
const DEFUSED = /^'+[=+\-@\t\r]/;

/** A text as a cell that no spreadsheet runs: a quote stands before it. A text that looks defused already gets one too, so that nothing is lost on the way back. */
export const defuse = (text: string): string => (FORMULA.test(text) ? `'${text}` : text);

/** The reverse of {@link defuse}. */
export const undefuse = (cell: string): string => (DEFUSED.test(cell) ? cell.slice(1) : cell);
