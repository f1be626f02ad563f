/** Addresses of a point's corrections, fills and results; tab and open sheets live in them. */
export const correctionsPaths = {
  corrections: (
    place: { readonly siteId: string; readonly loopId: string; readonly pointId: string },
    asked: Readonly<Record<string, string>> = {},
  ) => {
    const query = new URLSearchParams(asked).toString();
    const { siteId, loopId, pointId } = place;
    const path = `/sites/${siteId}/loops/${loopId}/points/${pointId}/corrections`;
    return query === "" ? path : `${path}?${query}`;
  },
} as const;
