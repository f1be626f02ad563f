/** Addresses of the screens of places. */
export const placesPaths = {
  sites: "/sites",
  newSite: "/sites/new",
  site: (siteId: string) => `/sites/${siteId}`,
  editSite: (siteId: string) => `/sites/${siteId}/edit`,
  buildings: (siteId: string) => `/sites/${siteId}/buildings`,
  loops: (siteId: string) => `/sites/${siteId}/loops`,
  newLoop: (siteId: string, buildingId?: string) =>
    `/sites/${siteId}/loops/new${buildingId ? `?building=${buildingId}` : ""}`,
  editLoop: (siteId: string, loopId: string) => `/sites/${siteId}/loops/${loopId}/edit`,
  points: (siteId: string, loopId: string) => `/sites/${siteId}/loops/${loopId}/points`,
  newPoint: (siteId: string, loopId: string) => `/sites/${siteId}/loops/${loopId}/points/new`,
  editPoint: (siteId: string, loopId: string, pointId: string) =>
    `/sites/${siteId}/loops/${loopId}/points/${pointId}`,
  /** The loop's own page: its energy and chart. */
  loop: (loopId: string, week?: string) => `/loops/${loopId}${week ? `?week=${week}` : ""}`,
} as const;
