import type { Interval } from "@shared/domain/time/interval";

interface Place {
  readonly siteId: string;
  readonly loopId: string;
  readonly pointId: string;
}

const MINUTE_MS = 60_000;
const iso = (ms: number) => new Date(ms).toISOString();

/** Addresses of a point's corrections, fills and results; tab and open sheets live in them. */
export const correctionsPaths = {
  corrections,
  /** Days as people count them, both shown. */
  fills: (place: Place, days: { readonly since: string; readonly until: string }) =>
    corrections(place, { tab: "fills", ...days }),
  /** The form that fills one gap, open over the days around it. */
  fill: (
    place: Place,
    gap: { readonly from: string; readonly to: string },
    days: { readonly since: string; readonly until: string },
  ) => corrections(place, { tab: "fills", ...days, fill: `${gap.from}_${gap.to}` }),
  /** The form that leaves a stretch out, filled in: whole minutes, as people give them. */
  exclude: (place: Place, { startMs, endMs }: Interval) =>
    corrections(place, {
      propose: "exclude",
      from: iso(Math.floor(startMs / MINUTE_MS) * MINUTE_MS),
      to: iso(Math.ceil(endMs / MINUTE_MS) * MINUTE_MS),
    }),
} as const;

function corrections(place: Place, asked: Readonly<Record<string, string>> = {}): string {
  const query = new URLSearchParams(asked).toString();
  const { siteId, loopId, pointId } = place;
  const path = `/sites/${siteId}/loops/${loopId}/points/${pointId}/corrections`;
  return query === "" ? path : `${path}?${query}`;
}
