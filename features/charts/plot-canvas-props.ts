import type { Direction, PlotPicture } from "./plot-picture";

/** Colours of one direction of heat, from the theme. */
export interface BandColours {
  readonly supply: string;
  readonly return: string;
  readonly fill: string;
}

export interface PlotColours extends Record<Direction, BandColours> {
  readonly bars: string;
}

export interface PlotCanvasProps {
  readonly picture: PlotPicture;
  readonly colours: PlotColours;
  /** Thicker lines where there is room for them. */
  readonly large: boolean;
}
