/** The point a comparison is opened from: it stands as the first meter, over the range that was shown. */
export interface ComparedFrom {
  readonly pointId: string;
  /** Left out on a changeover loop, which has both: it is asked. */
  readonly register?: "heating" | "cooling" | undefined;
  /** Whole days, `until` exclusive, YYYY-MM-DD. */
  readonly range?: { readonly from: string; readonly until: string } | undefined;
}

function fromPoint(from: ComparedFrom | undefined): string {
  if (from === undefined) return "";
  const { pointId, register, range } = from;
  return (
    `&point=${pointId}` +
    (register ? `&register=${register}` : "") +
    (range ? `&from=${range.from}&until=${range.until}` : "")
  );
}

/** Addresses of the screens of Compare. */
export const comparePaths = {
  compare: "/compare",
  newMeters: (siteId?: string, from?: ComparedFrom) =>
    `/compare/meters/new${siteId ? `?site=${siteId}${fromPoint(from)}` : ""}`,
  correctMeters: (id: string) => `/compare/meters/new?supersedes=${id}`,
  meters: (id: string) => `/compare/meters/${id}`,
} as const;
