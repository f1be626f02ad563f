import type { Transaction } from "sequelize";
import type { Scope } from "@server/database/scoped";
import { BoreVersion } from "@server/models/bore-version";

/** The pipe of each point as it is known now, by point id; one query for a list of points. */
export async function currentBores(
  scope: Scope,
  pointIds: readonly string[],
  transaction?: Transaction,
): Promise<Map<string, BoreVersion>> {
  if (pointIds.length === 0) return new Map();
  const versions = await scope.list(BoreVersion, {
    where: { pointId: [...pointIds], validTo: null },
    transaction,
  });
  return new Map(versions.map((version) => [version.pointId, version]));
}

/** The pipe of a point over time, newest first. */
export function boreHistory(scope: Scope, pointId: string): Promise<BoreVersion[]> {
  return scope.list(BoreVersion, {
    where: { pointId },
    order: [
      ["validFrom", "DESC"],
      ["id", "DESC"],
    ],
  });
}
