import { type RefObject, useEffect, useState } from 'react';

/** The size of an element's content in whole CSS pixels; zero until it has been laid out. */
export function useSize(element: RefObject<HTMLElement | null>): {
  widthPx: number;
  heightPx: number;
} {
  const [size, setSize] = useState({ widthPx: 0, heightPx: 0 });
  useEffect(() => {
    if (element.current === null) return;
    const observer = new ResizeObserver(([{ contentRect }]) =>
      setSize({
        widthPx: Math.floor(contentRect.width),
        heightPx: Math.floor(contentRect.height),
      }),
    );
    observer.observe(element.current);
    return () => observer.disconnect();
  }, [element]);
  return size;
}
