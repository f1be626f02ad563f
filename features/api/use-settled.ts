import { useEffect, useState } from "react";

/** A value once it has stopped changing for a moment: the server is not asked at every key. */
export function useSettled<Value>(value: Value, ms = 350): Value {
  const [settled, setSettled] = useState(value);
  useEffect(() => {
    const timer = setTimeout(() => setSettled(value), ms);
    return () => clearTimeout(timer);
  }, [value, ms]);
  return settled;
}
