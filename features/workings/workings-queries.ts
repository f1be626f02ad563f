import { queryOptions } from "@tanstack/react-query";

import {
  downloadWorkingsCsv,
  downloadWorkingsPdf,
  getWorkings,
  type WorkingsFigure,
} from "@shared/contracts/workings";
import type { Language } from "@shared/formats/language";
import { addressOf, call } from "@features/api";

/** A figure of a point over a range: everything the server must know. */
export interface AskedFigure {
  readonly pointId: string;
  readonly figure: WorkingsFigure;
  readonly register: "heating" | "cooling" | undefined;
  /** Dates of the site or instants, both alike; the end is not part of it. */
  readonly from: string;
  readonly to: string;
}

function partsOf({ pointId, figure, register, from, to }: AskedFigure) {
  return {
    params: { pointId },
    query: { figure, from, to, ...(register === undefined ? {} : { register }) },
  };
}

export const workingsQueries = {
  of: (asked: AskedFigure) =>
    queryOptions({
      queryKey: ["workings", asked],
      queryFn: ({ signal }) => call(getWorkings, { ...partsOf(asked), signal }),
      staleTime: 60_000,
    }),
};

export const workingsAddresses = {
  pdf: (asked: AskedFigure, language: Language) => {
    const { params, query } = partsOf(asked);
    return addressOf(downloadWorkingsPdf, { params, query: { ...query, language } });
  },
  csv: (asked: AskedFigure) => addressOf(downloadWorkingsCsv, partsOf(asked)),
};
