/** Addresses of the screens of Compare. */
export const comparePaths = {
  compare: "/compare",
  newMeters: (siteId?: string) => `/compare/meters/new${siteId ? `?site=${siteId}` : ""}`,
  correctMeters: (id: string) => `/compare/meters/new?supersedes=${id}`,
  meters: (id: string) => `/compare/meters/${id}`,
} as const;
