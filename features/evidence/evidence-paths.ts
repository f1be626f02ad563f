const of = (siteId: string, loopId: string, pointId: string) =>
  `/sites/${siteId}/loops/${loopId}/points/${pointId}`;

/** What a log file says of how a point was measured, on its way into the form of an installation. */
export interface TakenOver {
  readonly boreMm?: number;
  readonly outsideDiameterMm?: number;
  readonly wallMm?: number;
  readonly soundSpeedMPerS?: number;
  /** Of the flow meter or the logger, whichever wrote the file. */
  readonly serial?: string;
  readonly meterSerial?: string;
  readonly loggerSerial?: string;
  readonly supplyProbeSerial?: string;
  readonly returnProbeSerial?: string;
  /** UTC instant of the file's first reading, ISO 8601. */
  readonly startsAt?: string;
}

/** Addresses of the screens of a point's evidence. */
export const evidencePaths = {
  evidence: (siteId: string, loopId: string, pointId: string, version?: string) =>
    `${of(siteId, loopId, pointId)}/evidence${version ? `?version=${version}` : ""}`,
  newInstallation: (siteId: string, loopId: string, pointId: string) =>
    `${of(siteId, loopId, pointId)}/evidence/new`,
  correctInstallation: (siteId: string, loopId: string, pointId: string, installationId: string) =>
    `${of(siteId, loopId, pointId)}/evidence/${installationId}`,
  /** The form of an installation filled in from a log file; nothing is stored before it is saved. */
  takeOver: (
    siteId: string,
    loopId: string,
    pointId: string,
    installationId: string | null,
    known: TakenOver,
  ) => {
    const query = new URLSearchParams();
    for (const [name, value] of Object.entries(known))
      if (value !== undefined) query.set(name, String(value));
    return `${of(siteId, loopId, pointId)}/evidence/${installationId ?? "new"}?${query.toString()}`;
  },
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
