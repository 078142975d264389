/** The size of an element, kept up to date. */
import { type RefObject, useLayoutEffect, useState } from 'react';
import type { Viewport } from '../canvas/camera';

export function useSize(host: RefObject<HTMLElement | null>): Viewport {
  const [size, setSize] = useState<Viewport>({ widthPx: 0, heightPx: 0 });
  useLayoutEffect(() => {
    const element = host.current;
    if (element === null) return;
    const observer = new ResizeObserver(() => {
      setSize({ widthPx: element.clientWidth, heightPx: element.clientHeight });
    });
    observer.observe(element);
    return () => observer.disconnect();
  }, [host]);
  return size;
}
