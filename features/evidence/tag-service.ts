import type { LoopService } from "@shared/contracts/places";
import type { Service } from "@features/ui";

/** A loop's service as its tag is drawn. */
export function tagService(service: LoopService): Service {
  const services = { chilled: "cooling", hot: "heating", changeover: "changeover" } as const;
  return services[service];
}
