import { useCallback, useEffect, useState, type ComponentType } from "react";

import type { PlotCanvasProps } from "./plot-canvas-props";

type PlotComponent = ComponentType<PlotCanvasProps>;

let opening: Promise<PlotComponent> | null = null;
let opened: PlotComponent | null = null;

/** Skia's modules read CanvasKit while they are evaluated, so CanvasKit comes first. */
async function open(): Promise<PlotComponent> {
  await (await import("./load-skia")).loadSkia();
  opened = (await import("./skia-entry")).PlotCanvas;
  return opened;
}

function openOnce(): Promise<PlotComponent> {
  opening ??= open().catch((error: unknown) => {
    // A failed load may be tried again: the network may be back.
    opening = null;
    throw error;
  });
  return opening;
}

/** Call when idle after sign-in, so that the first chart opens at once. */
export function prefetchCharts(): void {
  openOnce().catch((error: unknown) => {
    console.warn("The drawing part could not be fetched ahead of time.", error);
  });
}

export interface PlotDoor {
  /** What draws the curves, once it is here; until then the frame stands alone. */
  readonly Plot: PlotComponent | null;
  readonly failed: boolean;
  readonly retry: () => void;
}

/** The one lazy door to Skia. A page never waits for it. */
export function usePlotDoor(): PlotDoor {
  const [Plot, setPlot] = useState<PlotComponent | null>(() => opened);
  const [failed, setFailed] = useState(false);
  const [attempt, setAttempt] = useState(0);
  useEffect(() => {
    let wanted = true;
    openOnce().then(
      (component) => wanted && setPlot(() => component),
      (error: unknown) => {
        console.warn("The drawing part did not load.", error);
        if (wanted) setFailed(true);
      },
    );
    return () => {
      wanted = false;
    };
  }, [attempt]);
  const retry = useCallback(() => {
    setFailed(false);
    setAttempt((before) => before + 1);
  }, []);
  return { Plot, failed, retry };
}
