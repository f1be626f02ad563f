/** A point that a file may belong to. */
export interface PointCandidate {
  readonly id: string;
  readonly code: string;
  readonly loopTag: string;
}

/** Where an instrument with some serial number is or was installed. */
export interface InstalledSerial {
  readonly pointId: string;
  readonly startsMs: number;
  /** Null while it is there. */
  readonly endsMs: number | null;
}

export interface FoundPoint {
  readonly pointId: string | null;
  readonly by: "serial" | "fileName" | null;
  /** Several points answer, so that somebody has to say. */
  readonly ambiguous: boolean;
}

/**
 * The point whose log a file is: where the instrument named in the file is installed, else the one
 * whose code stands in the file's name. Several answers are none.
 */
export function findPoint(
  fileName: string,
  installed: readonly InstalledSerial[],
  points: readonly PointCandidate[],
): FoundPoint {
  const known = new Set(points.map(({ id }) => id));
  const places = installed.filter(({ pointId }) => known.has(pointId));
  const there = places.filter(({ endsMs }) => endsMs === null);
  const bySerial = distinct((there.length > 0 ? there : places).map(({ pointId }) => pointId));
  if (bySerial.length === 1)
    return { pointId: bySerial[0] ?? null, by: "serial", ambiguous: false };
  const byName = pointsInName(fileName, points);
  if (byName.length === 1) return { pointId: byName[0] ?? null, by: "fileName", ambiguous: false };
  return { pointId: null, by: null, ambiguous: bySerial.length > 1 || byName.length > 1 };
}

function pointsInName(fileName: string, points: readonly PointCandidate[]): string[] {
  const name = words(fileName.replace(/(\.[a-z0-9]{1,5})+$/i, ""));
  const inName = (text: string) => words(text) !== "--" && name.includes(words(text));
  const named = points.filter(({ code }) => inName(code));
  // A code that is part of another one, as P-1 of P-1-A, was not meant.
  const whole = named.filter(
    ({ code }) =>
      !named.some(
        (other) => words(other.code) !== words(code) && words(other.code).includes(words(code)),
      ),
  );
  // Codes are unique on a loop; the loop's tag tells equal ones apart.
  const ofLoop = whole.filter(({ loopTag }) => inName(loopTag));
  return (whole.length > 1 && ofLoop.length > 0 ? ofLoop : whole).map(({ id }) => id);
}

/** Letters and digits with one dash around and between them, so that P-1 is no part of P-10. */
function words(text: string): string {
  const parts = text
    .toLowerCase()
    .normalize("NFKC")
    .replace(/[^\p{L}\p{N}]+/gu, "-")
    .replace(/^-|-$/g, "");
  return `-${parts}-`;
}

function distinct(values: readonly string[]): string[] {
  return [...new Set(values)];
}
