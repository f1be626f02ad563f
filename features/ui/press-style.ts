import { motion, webStyle } from "./theme";

/** A short dip while pressed; hover is only ever a hint, never the one way. */
export function pressOpacity(pressed: boolean) {
  return [{ opacity: pressed ? 0.75 : 1 }, webStyle({ transition: `opacity ${motion.quick}ms` })];
}
