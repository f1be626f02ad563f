import type { Candidate } from "./assign-columns";
import { saysQuantity, stemOf } from "./header-words";
import type { ColumnMeaning } from "./recipe";
import type { PointSet } from "./recognition";

/** What a metering point's set of columns may hold. */
const SET_ROLES: ReadonlySet<string> = new Set([
  "flow",
  "velocity",
  "pulses",
  "supply",
  "return",
  "signal",
  "power",
]);

/**
 * Sets of columns of several metering points in one file: `CH-1 flow, CH-1 supply, CH-2 flow, CH-2
 * supply`, or `Flow 1, Return 1, Flow 2, Return 2`, or the same headers over again. Each set holds a
 * quantity once and all hold the same ones, a flow or both temperatures among them; else there are no
 * sets and the list is empty. Which set is whose, no file says.
 */
export function findPointSets(candidates: readonly Candidate[]): readonly PointSet[] {
  const parts = candidates.filter(({ role }) => SET_ROLES.has(role));
  const byOwner = group(parts, ownerOf);
  const sets = isWholeSets(byOwner) ? byOwner : group(parts, occurrenceIn(parts));
  if (!isWholeSets(sets)) return [];
  return [...sets].map(([owner, columns]) => ({
    name: sets === byOwner ? owner : "",
    columns: columns.map(({ index, role, unit }) => ({
      index,
      meaning: role as ColumnMeaning,
      unit: role === "signal" ? "%" : unit,
    })),
  }));
}

/** What a header says besides its quantity: whose it is. */
function ownerOf({ words }: Candidate): string {
  return words
    .flatMap((word) => {
      if (saysQuantity(word)) return [];
      const stem = stemOf(word);
      return stem !== word && saysQuantity(stem) ? [word.slice(stem.length)] : [word];
    })
    .join(" ");
}

/** The first flow belongs with the first supply, the second with the second. */
function occurrenceIn(parts: readonly Candidate[]): (candidate: Candidate) => string {
  return (candidate) => {
    const alike = parts.filter(
      ({ role, name }) => role === candidate.role && name === candidate.name,
    );
    return String(alike.indexOf(candidate));
  };
}

function group(
  parts: readonly Candidate[],
  keyOf: (candidate: Candidate) => string,
): ReadonlyMap<string, readonly Candidate[]> {
  const groups = new Map<string, Candidate[]>();
  for (const part of parts) {
    const key = keyOf(part);
    groups.set(key, [...(groups.get(key) ?? []), part]);
  }
  return groups;
}

function isWholeSets(groups: ReadonlyMap<string, readonly Candidate[]>): boolean {
  const [first, ...others] = [...groups.values()].map((columns) =>
    columns.map(({ role }) => role).sort(),
  );
  if (first === undefined || others.length === 0) return false;
  const once = new Set(first).size === first.length;
  const has = (role: string) => first.some((other) => other === role);
  const says = has("flow") || has("velocity") || has("pulses") || has("power");
  return (
    once &&
    (says || (has("supply") && has("return"))) &&
    others.every((set) => set.join() === first.join())
  );
}
