import { type RefObject, useEffect, useRef, useState } from 'react';

/**
 * The width of an element in CSS pixels, followed as it changes.
 *
 * @param firstWidth the width until the element is measured (and where nothing can be measured)
 */
export function useWidth<E extends HTMLElement>(firstWidth: number): [RefObject<E | null>, number] {
  const ref = useRef<E>(null);
  const [width, setWidth] = useState(firstWidth);
  useEffect(() => {
    const element = ref.current;
    if (!element || typeof ResizeObserver === 'undefined') return undefined;
    const observer = new ResizeObserver(([entry]) => {
      if (entry && entry.contentRect.width > 0) setWidth(Math.round(entry.contentRect.width));
    });
    observer.observe(element);
    return () => observer.disconnect();
  }, []);
  return [ref, width];
}
