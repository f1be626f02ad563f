import type { ReactNode } from "react";

import type { ChartGestures } from "./chart-gestures";

export interface ChartSurfaceProps {
  /** What it is and how it is worked, for screen readers. */
  readonly label: string;
  /** Id of the hint that lists the keys. */
  readonly describedBy: string;
  readonly height: number;
  readonly gestures: ChartGestures;
  readonly children: ReactNode;
}
