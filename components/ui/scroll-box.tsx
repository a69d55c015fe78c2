'use client';

import { useEffect, useRef, useState, type ReactNode } from 'react';

/** Scrolls sideways where its content is wider than the page; only then is it a stop for the keyboard, with a name. */
export function ScrollBox({ labelledBy, children }: { labelledBy: string; children: ReactNode }) {
  const box = useRef<HTMLDivElement>(null);
  const [wider, setWider] = useState(false);
  useEffect(() => {
    const element = box.current;
    if (!element) return;
    const observer = new ResizeObserver(() => setWider(element.scrollWidth > element.clientWidth + 1));
    observer.observe(element);
    if (element.firstElementChild) observer.observe(element.firstElementChild);
    return () => observer.disconnect();
  }, []);
  return (
    <div
      ref={box}
      className="relative overflow-x-auto"
      {...(wider && { tabIndex: 0, role: 'region', 'aria-labelledby': labelledBy })}
    >
      {children}
    </div>
  );
}
