'use client';

import { useLayoutEffect, useRef, useState, type RefObject } from 'react';

/**
 * The width of an element as it is on screen, for figures that are drawn anew and never scaled. On the server, and
 * until it is measured, the given width holds.
 */
export function useElementWidth<Element extends HTMLElement>(initial: number): [RefObject<Element | null>, number] {
  const ref = useRef<Element>(null);
  const [width, setWidth] = useState(initial);
  useLayoutEffect(() => {
    const element = ref.current;
    if (!element) return;
    const measure = (): void => {
      const measured = Math.floor(element.getBoundingClientRect().width);
      if (measured > 0) setWidth(measured);
    };
    measure();
    const observer = new ResizeObserver(measure);
    observer.observe(element);
    return () => observer.disconnect();
  }, []);
  return [ref, width];
}
