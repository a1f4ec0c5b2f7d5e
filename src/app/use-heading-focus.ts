import { type RefObject, useEffect, useRef } from "react";
import { useLocation } from "react-router-dom";

/** What a page fetches first is there by then; later the person has begun to do something. */
const PATIENCE_MS = 5_000;

/**
 * After every change of page its heading has the focus, so that a screen reader says where one is and the next Tab goes
 * on from there. What already has the focus on the new page keeps it.
 *
 * @returns for the element that holds the page
 */
export function useHeadingFocus(): RefObject<HTMLElement | null> {
  const page = useRef<HTMLElement>(null);
  const { pathname } = useLocation();
  const shown = useRef(pathname);
  useEffect(() => {
    const root = page.current;
    // The first page is announced by the browser itself.
    if (!root || shown.current === pathname) return;
    shown.current = pathname;
    const focus = (): boolean => {
      if (root.contains(document.activeElement)) return true;
      const heading = root.querySelector<HTMLElement>("h1");
      if (!heading) return false;
      heading.tabIndex = -1;
      heading.focus({ preventScroll: true });
      return true;
    };
    if (focus()) return;
    const observer = new MutationObserver(() => {
      if (focus()) observer.disconnect();
    });
    observer.observe(root, { childList: true, subtree: true });
    const timer = setTimeout(() => observer.disconnect(), PATIENCE_MS);
    return () => {
      observer.disconnect();
      clearTimeout(timer);
    };
  }, [pathname]);
  return page;
}
