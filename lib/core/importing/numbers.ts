/**
 * A number as loggers and spreadsheets write it: `1.048`, `1,048`, `1 048,5`,
 * `18.5 °C`. A single comma is a decimal one; with a point too, the later of both
 * is. Null where it is none.
 */
export function numberIn(cell: string): number | null {
  let text = cell.trim().replace(/[\s\u00a0\u202f]/g, '').replace('−', '-').replace(/(°[CFPB]?x?|[CFV%]|dBm|SG)$/i, '');
  const comma = text.lastIndexOf(',');
  const point = text.lastIndexOf('.');
  if (comma >= 0 && point >= 0) text = comma > point ? text.replaceAll('.', '').replace(',', '.') : text.replaceAll(',', '');
  else if (comma >= 0) text = text.replace(',', '.');
  if (!/^[+-]?(\d+\.?\d*|\.\d+)(e[+-]?\d{1,2})?$/i.test(text)) return null;
  const value = Number(text);
  return Number.isFinite(value) ? value : null;
}
