'use client';

import 'uplot/dist/uPlot.min.css';
import { useEffect, useLayoutEffect, useRef } from 'react';
import uPlot from 'uplot';

interface PlotProps {
  /** Makes the options for a size; called again only when `kind` or the height changes. */
  options: (size: { width: number; height: number }, element: HTMLElement) => uPlot.Options;
  data: uPlot.AlignedData;
  height: number;
  /** A chart with other series or handlers is another kind and is built anew. */
  kind: string;
  /** Called before each drawing after a change of size, theme or fonts. */
  onMeasure?: (element: HTMLElement, width: number) => void;
  onReady?: (plot: uPlot | null) => void;
  className?: string;
}

/**
 * uPlot inside React: follows its element's width, the theme and the fonts, and
 * is taken down with the component. All else is told by `options`.
 */
export function Plot({ options, data, height, kind, onMeasure, onReady, className }: PlotProps) {
  const holder = useRef<HTMLDivElement>(null);
  const plot = useRef<uPlot | null>(null);
  const latest = useRef({ options, data, onMeasure, onReady });
  useLayoutEffect(() => {
    latest.current = { options, data, onMeasure, onReady };
  });

  useEffect(() => {
    const element = holder.current;
    if (!element) return;
    const width = () => Math.max(40, Math.round(element.clientWidth));
    latest.current.onMeasure?.(element, width());
    const made = new uPlot(latest.current.options({ width: width(), height }, element), latest.current.data, element);
    plot.current = made;
    latest.current.onReady?.(made);

    const redraw = () => {
      latest.current.onMeasure?.(element, width());
      made.redraw(true, false);
    };
    const resize = new ResizeObserver(() => {
      latest.current.onMeasure?.(element, width());
      if (made.width !== width()) made.setSize({ width: width(), height });
    });
    resize.observe(element);
    const theme = new MutationObserver(redraw);
    theme.observe(document.documentElement, { attributes: true, attributeFilter: ['data-theme', 'class', 'style'] });
    let gone = false;
    // Canvas text drawn before the faces arrive would stay in the fallback.
    void document.fonts.ready.then(() => {
      if (!gone) redraw();
    });
    return () => {
      gone = true;
      resize.disconnect();
      theme.disconnect();
      latest.current.onReady?.(null);
      plot.current = null;
      made.destroy();
    };
  }, [kind, height]);

  useEffect(() => {
    const made = plot.current;
    const element = holder.current;
    if (!made || !element) return;
    latest.current.onMeasure?.(element, Math.max(40, Math.round(element.clientWidth)));
    made.setData(data, true);
  }, [data]);

  return <div ref={holder} className={className} aria-hidden="true" />;
}
