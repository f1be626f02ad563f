import type { Fitting } from "./installation-values";

export const fittings: readonly Fitting[] = [
  "none",
  "bend",
  "twoBendsInPlane",
  "twoBendsOutOfPlane",
  "tee",
  "reducer",
  "valveOpen",
  "valveThrottled",
  "pump",
];
