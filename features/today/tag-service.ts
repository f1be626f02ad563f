import type { LoopService } from "@shared/contracts/places";
import type { Service } from "@features/ui";

/** The tag's service of a loop's: chilled water takes heat in, hot water gives it out. */
export function tagService(service: LoopService): Service {
  return ({ chilled: "cooling", hot: "heating", changeover: "changeover" } as const)[service];
}
