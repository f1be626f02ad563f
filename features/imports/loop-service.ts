import type { Service } from "@features/ui";

/** What a loop does to its building, in the kit's words. */
export function serviceOfLoop(service: "chilled" | "hot" | "changeover"): Service {
  if (service === "chilled") return "cooling";
  return service === "hot" ? "heating" : "changeover";
}
