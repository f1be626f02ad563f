/** Where the things behind a figure are. */
export const behindPaths = {
  evidence: (siteId: string, loopId: string, pointId: string) =>
    `/sites/${siteId}/loops/${loopId}/points/${pointId}/evidence`,
  corrections: (siteId: string, loopId: string, pointId: string) =>
    `/sites/${siteId}/loops/${loopId}/points/${pointId}/corrections`,
  file: (importId: string) => `/logs/${importId}`,
  /** The rows themselves: the loop's table at the days of the range, both shown. */
  rows: (loopId: string, pointId: string, firstDay: string, lastDay: string) =>
    `/loops/${loopId}?point=${pointId}&from=${firstDay}&to=${lastDay}&show=table&rows=row`,
} as const;
