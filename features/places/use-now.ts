import { useEffect, useState } from "react";

const MINUTE_MS = 60_000;

/** The instant it is, to the minute: “so far” must not stand still while a page stays open. */
export function useNow(): number {
  const [now, setNow] = useState(() => Date.now());
  useEffect(() => {
    const timer = setInterval(() => setNow(Date.now()), MINUTE_MS);
    return () => clearInterval(timer);
  }, []);
  return now;
}
