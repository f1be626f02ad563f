/**
 * One thing the import did, or would do, to the rows of a file: listed, counted, reversible.
 * The same list stands on the Checks step, the Result step and the import's page.
 */
export interface RepairStep {
  readonly code: RepairStepCode;
  /** Rows (or cells, for sentinels and units) it touches. */
  readonly count: number;
  /** Up to 20 examples. */
  readonly examples: readonly RowExample[];
  /** What a count is made of, e.g. {"-9999": 12, "OL": 3} for sentinels. */
  readonly countByKind: Readonly<Record<string, number>>;
}

export type RepairStepCode =
  | "unreadableCells"
  | "shortRows"
  | "unreadableTimes"
  | "sentinels"
  | "identicalRepeats"
  | "conflictingRepeats"
  | "outOfOrder"
  | "repeatedHour"
  | "missingHour"
  | "weakSignal"
  | "overlapEqual"
  | "overlapDifferent"
  | "unitConversion"
  | "counterRollover"
  | "counterReset"
  | "counterJump"
  | "counterExchange"
  | "velocityTimesBore"
  | "pulsesToFlow"
  | "pulseOpening"
  | "badStatus"
  | "footer";

export interface RowExample {
  /** 1-based line in the file. */
  readonly line: number;
  readonly column: string | null;
  readonly cell: string | null;
  readonly instantMs: number | null;
}

export interface Gap {
  readonly fromMs: number;
  readonly toMs: number;
  /** Rows that the nominal step would have put there. */
  readonly missingRows: number;
  readonly flowBeforeM3PerHour: number | null;
  readonly flowAfterM3PerHour: number | null;
}
