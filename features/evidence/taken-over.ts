import type { Instrument } from "@shared/contracts/evidence";
import { plainSerial } from "@shared/domain/log-files/plain-serial";
import { localDateOf } from "@shared/domain/time/local-calendar";
import { NONE, type InstallationValues } from "./installation-values";

/** What the address of the form brings from a log file: any of it may be missing or nonsense. */
export type TakenOverParams = Readonly<Record<string, string | readonly string[] | undefined>>;

export interface Prefill {
  readonly changes: Partial<InstallationValues>;
  /** Serials that no instrument of the kit has. */
  readonly unknownSerials: readonly string[];
}

/**
 * The form's values that a log file knows. Only what is empty in the form is filled: what somebody
 * recorded is not replaced. Null where the address brings nothing.
 */
export function prefillOf(
  params: TakenOverParams,
  kit: readonly Instrument[],
  zone: string,
  before: InstallationValues,
): Prefill | null {
  const text = (name: string): string | null => {
    const value = params[name];
    return typeof value === "string" && value !== "" && value.length <= 60 ? value : null;
  };
  const number = (name: string, min: number, max: number): number | null => {
    const value = Number(text(name) ?? NaN);
    return value >= min && value <= max ? value : null;
  };
  const unknownSerials: string[] = [];
  const idOf = (serial: string | null, kinds: readonly Instrument["kind"][]): string | null => {
    if (serial === null) return null;
    const found = kit.find(
      (one) =>
        one.archivedAt === null &&
        kinds.includes(one.kind) &&
        plainSerial(one.serial) === plainSerial(serial),
    );
    if (found === undefined) unknownSerials.push(serial);
    return found?.id ?? null;
  };
  const serial = text("serial");
  const meters = ["flowMeter", "permanentMeter"] as const;
  // Whatever wrote the file: a meter that logs by itself, else a logger.
  const isLogger = kit.some(
    (one) =>
      one.kind === "logger" && serial !== null && plainSerial(one.serial) === plainSerial(serial),
  );
  const meterId = idOf(text("meterSerial") ?? (isLogger ? null : serial), meters);
  const loggerId = idOf(text("loggerSerial") ?? (isLogger ? serial : null), ["logger"]);
  const supplyId = idOf(text("supplyProbeSerial"), ["probe"]);
  const returnId = idOf(text("returnProbeSerial"), ["probe"]);
  const startsAt = Date.parse(text("startsAt") ?? "");
  const wall = number("wallMm", 0.5, 40);
  const numbers = {
    enteredBoreMm: number("boreMm", 10, 1300),
    outsideDiameterMm: number("outsideDiameterMm", 15, 1300),
    soundSpeedMPerS: number("soundSpeedMPerS", 1000, 2000),
  };

  const changes: { -readonly [Name in keyof InstallationValues]?: InstallationValues[Name] } = {};
  if (meterId !== null && before.flowMeterId === NONE) changes.flowMeterId = meterId;
  if (loggerId !== null && before.loggerId === NONE) changes.loggerId = loggerId;
  if (supplyId !== null && before.supply.probeId === NONE)
    changes.supply = { ...before.supply, probeId: supplyId };
  if (returnId !== null && before.return.probeId === NONE)
    changes.return = { ...before.return, probeId: returnId };
  for (const name of ["enteredBoreMm", "outsideDiameterMm", "soundSpeedMPerS"] as const)
    if (numbers[name] !== null && before[name] === null) changes[name] = numbers[name];
  if (wall !== null && before.walls === "") changes.walls = String(wall);
  if (!Number.isNaN(startsAt) && before.startDate === null)
    changes.startDate = localDateOf(startsAt, zone);
  if (Object.keys(changes).length === 0 && unknownSerials.length === 0) return null;
  return { changes, unknownSerials };
}
