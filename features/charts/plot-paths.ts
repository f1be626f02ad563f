import { Skia, type SkPath } from "@shopify/react-native-skia";

import type { BandPoint, PlotPicture } from "./plot-picture";

/** Closed shapes between two curves; a missing end on either side opens a hole. */
export function bandPath(points: readonly BandPoint[]): SkPath {
  const path = Skia.PathBuilder.Make();
  let run: { x: number; y: number; y0: number }[] = [];
  const close = () => {
    const [first, ...rest] = run;
    if (first) {
      path.moveTo(first.x, first.y);
      for (const { x, y } of rest) path.lineTo(x, y);
      for (const { x, y0 } of run.reverse()) path.lineTo(x, y0);
      path.close();
    }
    run = [];
  };
  for (const { x, y, y0 } of points) {
    if (y === null || y0 === null) close();
    else run.push({ x, y, y0 });
  }
  close();
  return path.build();
}

export function barsPath(bars: PlotPicture["bars"]): SkPath {
  const path = Skia.PathBuilder.Make();
  for (const bar of bars) path.addRect(Skia.XYWHRect(bar.x, bar.y, bar.width, bar.height));
  return path.build();
}
