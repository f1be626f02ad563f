/** One line of the bench: what was promised, what we measured, what somebody else needs. */
export interface Line {
  readonly goal: string;
  readonly promise: string;
  readonly ours: string;
  readonly peer: string;
  readonly ratio: string;
  /** Null where nothing was promised or the peer is not on this machine. */
  readonly met: boolean | null;
}

const headings = ["goal", "promise", "ours", "peer", "ratio", ""] as const;

const verdict = (met: boolean | null) => (met === null ? "–" : met ? "met" : "NOT MET");

/** The one table the bench prints. */
export function table(lines: readonly Line[]): string {
  const rows = [
    [...headings],
    ...lines.map(({ goal, promise, ours, peer, ratio, met }) => [
      goal,
      promise,
      ours,
      peer,
      ratio,
      verdict(met),
    ]),
  ];
  const widths = headings.map((_, column) =>
    Math.max(...rows.map((row) => (row[column] ?? "").length)),
  );
  return rows
    .map((row) =>
      row
        .map((cell, column) => cell.padEnd(widths[column] ?? 0))
        .join("  ")
        .trimEnd(),
    )
    .join("\n");
}

/** A duration with the digits a person compares: 0.412 s, 38 ms. */
export function time(seconds: number): string {
  return seconds < 0.1 ? `${(seconds * 1000).toFixed(1)} ms` : `${seconds.toFixed(2)} s`;
}

export const times = (ratio: number) => `${ratio.toFixed(ratio < 10 ? 1 : 0)}×`;
