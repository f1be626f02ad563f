import { UniqueConstraintError } from "sequelize";
import { Conflict, Invalid } from "@server/http/errors";

/** Which field of the body each unique key of the places tables is about. */
const keys: Readonly<Record<string, { field: string; code: string; taken: string }>> = {
  building_name: {
    field: "name",
    code: "name-taken",
    taken: "Another building of this site has this name.",
  },
  loop_tag: {
    field: "tag",
    code: "tag-taken",
    taken: "Another loop of this site has this tag.",
  },
  metering_point_code: {
    field: "code",
    code: "code-taken",
    taken: "Another point of this loop has this code.",
  },
};

/**
 * Runs a write and turns a taken tag, code or name into words. The database decides, so two people
 * saving at once cannot both win.
 * @throws Invalid naming the field; Conflict where an archived thing wants its name back.
 */
export async function namingFields<Result>(
  write: () => Promise<Result>,
  restoring = false,
): Promise<Result> {
  try {
    return await write();
  } catch (error) {
    if (!(error instanceof UniqueConstraintError)) throw error;
    const key = Object.entries(keys).find(([name]) => String(error.parent.message).includes(name));
    if (key === undefined) throw error;
    const { field, code, taken } = key[1];
    if (restoring)
      throw new Conflict(code, taken, `Change the ${field} of one of the two, then restore it.`);
    throw Invalid.field(field, code, taken);
  }
}
