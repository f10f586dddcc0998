import type uPlot from 'uplot';
import { afterAll, describe, expect, it, vi } from 'vitest';

/** What the library asks of a browser when it is loaded, and of a canvas when it draws bars. */
const nothing = () => {};
vi.stubGlobal('devicePixelRatio', 1);
vi.stubGlobal('matchMedia', () => ({ addEventListener: nothing, removeEventListener: nothing }));
vi.stubGlobal('window', { addEventListener: nothing, dispatchEvent: nothing });
vi.stubGlobal('navigator', { language: 'en-GB' });
vi.stubGlobal('document', { addEventListener: nothing });
vi.stubGlobal('Path2D', function Path2D() {
  return { rect: nothing, moveTo: nothing, lineTo: nothing, arcTo: nothing, closePath: nothing };
});
// Another file of this process may have loaded it without a browser.
vi.resetModules();
const { default: Plot } = await import('uplot');
const { GAS_BARS } = await import('@/components/charts/options');
afterAll(() => {
  vi.unstubAllGlobals();
  vi.resetModules();
});

/** A plot of 100 px on 100 s, as far as the bars ask for one. */
function drawn(data: uPlot.AlignedData): { left: number; width: number }[] {
  const found: { left: number; width: number }[] = [];
  const scale = { ori: 0, dir: 1, distr: 1, key: 'x', min: 0, max: 100 };
  const toX = (value: number) => value;
  const plot = {
    mode: 1,
    series: [{ scale: 'x' }, { scale: 'gas', pxRound: (value: number) => value, width: 0, min: 0, max: 1, fillTo: () => 0 }],
    data,
    _data: data,
    bands: [],
    scales: { x: scale, gas: { ...scale, ori: 1, dir: -1, key: 'gas', min: 0, max: 1 } },
    bbox: { left: 0, top: 0, width: 100, height: 50 },
    valToPosH: toX,
    valToPosV: (value: number) => 50 - value * 50,
  };
  const bars = Plot.paths.bars!({ ...GAS_BARS, each: (_plot, _series, _index, left, _top, width) => found.push({ left, width }) });
  bars(plot as unknown as uPlot, 1, 0, data[0].length - 1);
  return found;
}

describe('the bars of gas', () => {
  it('stand around the middle of their hours, which is what a figure of gas is told for', () => {
    const at = [10, 20, 30];
    const found = drawn([at, [0.2, 0.6, 0.4]]);
    expect(found.map(({ left, width }) => left + width / 2)).toEqual(at);
    // Nor is one as wide as to stand in its neighbour's hours.
    for (const { width } of found) expect(width).toBeLessThanOrEqual(10);
  });
});
