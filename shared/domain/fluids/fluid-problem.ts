/** Why a fluid's properties cannot be worked out. Codes are stable; screens translate them. */
export interface FluidProblem {
  readonly code:
    | "temperatureMissing"
    | "belowFreezing"
    | "belowRange"
    | "aboveRange"
    | "boiling"
    | "pressureOutOfRange"
    | "concentrationOutOfRange";
  /** Which input is at fault. */
  readonly place: "temperature" | "pressure" | "concentration";
  /** The value met: °C for a temperature, MPa absolute for a pressure, percent as entered for glycol. */
  readonly value: number | null;
  readonly message: string;
  readonly remedy: string;
}
