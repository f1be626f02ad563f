import type { Transaction } from "sequelize";
import type { BoreSpan } from "@shared/domain/log-files/water-flow";
import { BoreVersion } from "@server/models/bore-version";

/**
 * The bores of a point by ascending time. The point must have been found through the organisation's
 * scope.
 */
export async function boresOf(pointId: string, transaction?: Transaction): Promise<BoreSpan[]> {
  const versions = await BoreVersion.findAll({
    where: { pointId },
    order: [["validFrom", "ASC"]],
    transaction,
  });
  return versions.map(({ validFrom, validTo, insideDiameterMm }) => ({
    fromMs: validFrom.getTime(),
    toMs: validTo?.getTime() ?? null,
    insideDiameterMm,
  }));
}
