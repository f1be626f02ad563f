import { useEffect, useRef } from "react";

/** A new page starts at its top; going back or forward keeps the place the browser restores. */
export function useScrollTop(path: string): void {
  const wentBack = useRef(false);
  useEffect(() => {
    const note = () => {
      wentBack.current = true;
    };
    window.addEventListener("popstate", note);
    return () => window.removeEventListener("popstate", note);
  }, []);
  useEffect(() => {
    if (!wentBack.current) window.scrollTo(0, 0);
    wentBack.current = false;
  }, [path]);
}
