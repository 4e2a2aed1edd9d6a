import { useEffect, useRef, useState } from "react";

const AT_FIRST = 720;

/** Width of an element as it is laid out, so that a drawing keeps its text at full size. */
export function useWidth<Element extends HTMLElement>() {
  const ref = useRef<Element>(null);
  const [width, setWidth] = useState(AT_FIRST);
  useEffect(() => {
    const element = ref.current;
    if (!element || typeof ResizeObserver === "undefined") return;
    const observer = new ResizeObserver(([entry]) => setWidth(Math.max(240, Math.round(entry?.contentRect.width ?? AT_FIRST))));
    observer.observe(element);
    return () => observer.disconnect();
  }, []);
  return { ref, width };
}
