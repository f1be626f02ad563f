import type { PointSummary } from "@shared/contracts/energy";
import type { Loop, Point, Site } from "@shared/contracts/places";
import type { Format } from "@features/i18n";

import type { OpenWorkings } from "@features/workings/use-workings";

import type { ShownRange } from "./shown-range";

/** What every part of the loop page is about. */
export interface LoopView {
  readonly site: Site;
  readonly loop: Loop;
  readonly point: Point;
  readonly points: readonly Point[];
  readonly range: ShownRange;
  /** The site's day. */
  readonly today: string;
  readonly format: Format;
  /** "week 20" or "9 May to 18 May". */
  readonly rangeName: string;
}

export interface LoopFigures extends LoopView {
  readonly summary: PointSummary;
}

/** What a part needs whose figures open their workings. */
export interface FiguresWithWorkings extends LoopFigures {
  readonly workings: OpenWorkings;
}
