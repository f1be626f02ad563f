/** Why a fluid's properties cannot be worked out. Codes are stable; screens translate them. */
export interface FluidProblem {
  readonly code:
    | "temperatureMissing"
    | "belowFreezing"
    | "aboveRange"
    | "boiling"
    | "pressureOutOfRange"
    | "glycolNotComputed";
  /** Which input is at fault. */
  readonly place: "temperature" | "pressure" | "fluid";
  /** The value met, in °C for a temperature, MPa absolute for a pressure, percent for a glycol. */
  readonly value: number | null;
  readonly message: string;
  readonly remedy: string;
}
