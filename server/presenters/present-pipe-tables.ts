import type { z } from "zod";
import type { listPipeTables } from "@shared/contracts/places";
import { PIPE_TABLES } from "@shared/domain/pipes/pipe-tables";

export function presentPipeTables(): z.input<(typeof listPipeTables)["answer"]> {
  return {
    items: PIPE_TABLES.map(({ id, standard, series, material, sizes }) => ({
      id,
      standard,
      series,
      material,
      rows: sizes.map(({ dn, outsideDiameterMm, wallMm, liningMm, boreMm }) => ({
        dn,
        outsideDiameterMm,
        wallMm,
        liningMm,
        insideDiameterMm: boreMm,
      })),
    })),
  };
}
