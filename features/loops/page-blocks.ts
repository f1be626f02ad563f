/** The page's parts while they load: card and figures, then the chart. */
export const pageBlocks = [
  { width: "100%", height: 210 },
  { width: "100%", height: 460 },
] as const;
