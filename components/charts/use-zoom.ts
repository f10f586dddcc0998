'use client';

import { useEffect, useRef, type RefObject } from 'react';
import type { Span } from './picture';
import { afterKey, isWhole, moved, zoomed } from './zoom';

interface Zoom {
  span: Span;
  whole: Span;
  onSpan: (span: Span) => void;
  /** Gutters left and right of the plot, px. */
  left: number;
  right: number;
}

/**
 * Fingers, wheel and keys. One finger moves along once zoomed in, two zoom; the
 * wheel zooms while the chart has the focus or Ctrl is held (as a pinch on a
 * trackpad is told), so that a page scrolled past it keeps scrolling.
 */
export function useZoom(target: RefObject<HTMLElement | null>, zoom: Zoom): void {
  const latest = useRef(zoom);
  useEffect(() => {
    latest.current = zoom;
  });

  useEffect(() => {
    const element = target.current;
    if (!element) return;
    const fingers = new Map<number, number>();
    const plot = () => {
      const box = element.getBoundingClientRect();
      return { from: box.left + latest.current.left, width: box.width - latest.current.left - latest.current.right };
    };
    const timeAt = (clientX: number) => {
      const { span } = latest.current;
      const { from, width } = plot();
      return span.from + ((clientX - from) / width) * (span.to - span.from);
    };

    const onWheel = (event: WheelEvent) => {
      if (!event.ctrlKey && !event.metaKey && !element.contains(document.activeElement)) return;
      event.preventDefault();
      const { span, whole, onSpan } = latest.current;
      onSpan(zoomed(span, whole, Math.exp(-event.deltaY * 0.0025), timeAt(event.clientX)));
    };
    const onKey = (event: KeyboardEvent) => {
      if (event.target !== element || event.ctrlKey || event.metaKey || event.altKey) return;
      const next = afterKey(event.key, latest.current.span, latest.current.whole);
      if (!next) return;
      event.preventDefault();
      latest.current.onSpan(next);
    };
    const onDown = (event: PointerEvent) => {
      if (event.pointerType === 'touch') fingers.set(event.pointerId, event.clientX);
    };
    const onMove = (event: PointerEvent) => {
      const before = fingers.get(event.pointerId);
      if (before === undefined) return;
      const { span, whole, onSpan } = latest.current;
      const other = [...fingers].find(([pointer]) => pointer !== event.pointerId)?.[1];
      fingers.set(event.pointerId, event.clientX);
      if (other === undefined) {
        if (!isWhole(span, whole)) onSpan(moved(span, whole, (before - event.clientX) / plot().width));
        return;
      }
      const [apart, apartBefore] = [Math.abs(event.clientX - other), Math.abs(before - other)];
      if (apart > 8 && apartBefore > 8) onSpan(zoomed(span, whole, apart / apartBefore, timeAt((event.clientX + other) / 2)));
    };
    const onUp = (event: PointerEvent) => fingers.delete(event.pointerId);

    element.addEventListener('wheel', onWheel, { passive: false });
    element.addEventListener('keydown', onKey);
    element.addEventListener('pointerdown', onDown);
    element.addEventListener('pointermove', onMove);
    element.addEventListener('pointerup', onUp);
    element.addEventListener('pointercancel', onUp);
    return () => {
      element.removeEventListener('wheel', onWheel);
      element.removeEventListener('keydown', onKey);
      element.removeEventListener('pointerdown', onDown);
      element.removeEventListener('pointermove', onMove);
      element.removeEventListener('pointerup', onUp);
      element.removeEventListener('pointercancel', onUp);
    };
  }, [target]);
}
