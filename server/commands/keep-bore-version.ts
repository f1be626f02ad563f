import type { Transaction } from "sequelize";
import type { Pipe } from "@shared/contracts/places";
import { resolvePipe } from "@shared/domain/pipes/resolve-pipe";
import { Invalid } from "@server/http/errors";
import { BoreVersion } from "@server/models/bore-version";
import type { Acting } from "./acting";

const sentences = {
  noSuchTable: ["no-such-table", "There is no such pipe table: list them with GET /pipe-tables."],
  noSuchSize: ["no-such-size", "This table has no pipe of that nominal size."],
  noBoreLeft: ["no-bore-left", "Walls and lining together leave nothing of the bore."],
} as const;

/** @throws Invalid pointing at the part of the pipe that is wrong. */
function dimensionsOf(pipe: Pipe) {
  const resolved = resolvePipe(pipe);
  if (resolved.ok) return resolved.dimensions;
  const [code, message] = sentences[resolved.code];
  throw Invalid.field(`pipe/${resolved.field}`, code, message);
}

function isSame(before: Pipe, pipe: Pipe): boolean {
  if (before.kind === "table")
    return pipe.kind === "table" && before.tableId === pipe.tableId && before.dn === pipe.dn;
  return (
    pipe.kind === "measured" &&
    before.outsideDiameterMm === pipe.outsideDiameterMm &&
    before.wallMm === pipe.wallMm &&
    before.liningMm === pipe.liningMm &&
    before.material === pipe.material
  );
}

/**
 * Makes `pipe` the point's pipe from now on: the version so far ends now, and a new one begins;
 * null ends it without another. The caller holds a lock on the point's loop.
 * @returns what was known before, or undefined where nothing changed.
 */
export async function keepBoreVersion(
  { actor, scope, clock }: Acting,
  pointId: string,
  pipe: Pipe | null,
  transaction: Transaction,
): Promise<Pipe | null | undefined> {
  const dimensions = pipe && dimensionsOf(pipe);
  const current = await scope.find(BoreVersion, {
    where: { pointId, validTo: null },
    transaction,
  });
  if (current ? pipe !== null && isSame(current.pipe, pipe) : pipe === null) return undefined;
  const now = clock.date();
  const before = current?.pipe ?? null;
  // A version that would end in the instant it began was a slip of the pen, not a pipe.
  if (current && current.validFrom.getTime() >= now.getTime())
    await current.destroy({ transaction });
  else await current?.update({ validTo: now }, { transaction });
  if (pipe && dimensions)
    await scope.create(
      BoreVersion,
      {
        ...dimensions,
        pointId,
        kind: pipe.kind,
        tableId: pipe.kind === "table" ? pipe.tableId : null,
        dn: pipe.kind === "table" ? pipe.dn : null,
        validFrom: now,
        validTo: null,
        accountId: actor.accountId,
      },
      { transaction },
    );
  return before;
}
