import { type RefObject, useLayoutEffect, useState } from "react";

export interface BoxSize {
  width: number;
  height: number;
}

/** Size of an element in px, kept up to date; `initial` until it has been laid out. */
export function useBoxSize(box: RefObject<Element | null>, initial: BoxSize): BoxSize {
  const [size, setSize] = useState(initial);
  useLayoutEffect(() => {
    const element = box.current;
    if (!element) return;
    const measure = () => {
      const { clientWidth: width, clientHeight: height } = element;
      if (width > 0 && height > 0)
        setSize((old) => (old.width === width && old.height === height ? old : { width, height }));
    };
    measure();
    const observer = new ResizeObserver(measure);
    observer.observe(element);
    return () => observer.disconnect();
  }, [box]);
  return size;
}
