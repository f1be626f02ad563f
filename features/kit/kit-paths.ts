/** Addresses of the screens of the kit. */
export const kitPaths = {
  kit: "/kit",
  newInstrument: "/kit/new",
  instrument: (instrumentId: string) => `/kit/${instrumentId}`,
  editInstrument: (instrumentId: string) => `/kit/${instrumentId}/edit`,
  bathChecks: "/kit/bath-checks",
  newBathCheck: (pair?: { first: string; second: string }) =>
    `/kit/bath-checks/new${pair ? `?first=${pair.first}&second=${pair.second}` : ""}`,
  correctBathCheck: (bathCheckId: string) => `/kit/bath-checks/new?replaces=${bathCheckId}`,
  bathCheck: (bathCheckId: string) => `/kit/bath-checks/${bathCheckId}`,
} as const;
