const of = (siteId: string, loopId: string, pointId: string) =>
  `/sites/${siteId}/loops/${loopId}/points/${pointId}`;

/** Addresses of the screens of a point's evidence. */
export const evidencePaths = {
  evidence: (siteId: string, loopId: string, pointId: string, version?: string) =>
    `${of(siteId, loopId, pointId)}/evidence${version ? `?version=${version}` : ""}`,
  newInstallation: (siteId: string, loopId: string, pointId: string) =>
    `${of(siteId, loopId, pointId)}/evidence/new`,
  correctInstallation: (siteId: string, loopId: string, pointId: string, installationId: string) =>
    `${of(siteId, loopId, pointId)}/evidence/${installationId}`,
  /** The correction that puts flow right by a measured bore, filled in. */
  scaleByBore: (
    siteId: string,
    loopId: string,
    pointId: string,
    bores: { readonly enteredMm: number; readonly trueMm: number },
  ) =>
    `${of(siteId, loopId, pointId)}/corrections?propose=scaleByBore` +
    `&entered=${bores.enteredMm}&true=${bores.trueMm}`,
} as const;
