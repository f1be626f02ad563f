import { useEffect, useRef } from "react";

/**
 * A new page, or step of one, starts at its top; going back or forward keeps the place the browser
 * restores, and so does opening it.
 */
export function useScrollTop(place: string): void {
  const before = useRef(place);
  const wentBack = useRef(false);
  useEffect(() => {
    const note = () => {
      wentBack.current = true;
    };
    window.addEventListener("popstate", note);
    return () => window.removeEventListener("popstate", note);
  }, []);
  useEffect(() => {
    if (place === before.current) return;
    before.current = place;
    if (!wentBack.current) window.scrollTo(0, 0);
    wentBack.current = false;
  }, [place]);
}
