/** Addresses of the loop page; its state lives in the URL. */
export const loopsPaths = {
  loop: (loopId: string, range: Readonly<Record<string, string>> = {}) => {
    const query = new URLSearchParams(range).toString();
    return `/loops/${loopId}${query ? `?${query}` : ""}`;
  },
  sites: "/sites",
  site: (siteId: string) => `/sites/${siteId}`,
  point: (siteId: string, loopId: string, pointId: string) =>
    `/sites/${siteId}/loops/${loopId}/points/${pointId}`,
  editSite: (siteId: string) => `/sites/${siteId}/edit`,
  editLoop: (siteId: string, loopId: string) => `/sites/${siteId}/loops/${loopId}/edit`,
  pump: (siteId: string, loopId: string) => `/sites/${siteId}/loops/${loopId}/pump`,
  newPoint: (siteId: string, loopId: string) => `/sites/${siteId}/loops/${loopId}/points/new`,
  import: (importId: string) => `/logs/${importId}`,
  importLog: (pointId: string) => `/logs/new?point=${pointId}`,
} as const;
