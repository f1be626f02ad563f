import { Invalid } from "@server/http/errors";

interface Child {
  readonly id: string;
  readonly parentId: string | null;
  readonly inUse: boolean;
}

interface Rule {
  /** The body's field that names the parent. */
  readonly field: "parentLoopId" | "parentPointId";
  /** Such as "loop" and "site". */
  readonly thing: string;
  readonly whole: string;
}

/**
 * A parent is another thing in use of the same whole, and following parents never comes back: a
 * balance adds children up under their parent, so a ring would count water twice.
 * @param siblings every loop of the site, or every point of the loop.
 * @param childId null for one that is being made.
 * @throws Invalid pointing at the field.
 */
export function requireParent(
  siblings: readonly Child[],
  childId: string | null,
  parentId: string,
  { field, thing, whole }: Rule,
): void {
  const byId = new Map(siblings.map((sibling) => [sibling.id, sibling]));
  const parent = byId.get(parentId);
  if (parent === undefined || !parent.inUse)
    throw Invalid.field(field, "no-such-parent", `This ${whole} has no such ${thing} in use.`);
  const seen = new Set<string>();
  for (let at: Child | undefined = parent; at !== undefined;) {
    if (at.id === childId)
      throw Invalid.field(
        field,
        "parent-ring",
        at === parent
          ? `A ${thing} cannot feed itself.`
          : `That ${thing} is itself fed by this one: pick one further upstream.`,
      );
    if (seen.has(at.id)) return;
    seen.add(at.id);
    at = at.parentId === null ? undefined : byId.get(at.parentId);
  }
}
