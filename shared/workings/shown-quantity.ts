import type { Workings } from "../contracts/workings";
import type { Quantity } from "../domain/units/display-units";

/** The quantity a figure is shown as; null for a share in percent. */
export function quantityOf({
  figure,
  register,
}: Pick<Workings, "figure" | "register">): Quantity | null {
  switch (figure) {
    case "energy":
      return register === "heating" ? "heatingEnergy" : "coolingEnergy";
    case "power":
    case "nightBase":
      return register === "heating" ? "heatingPower" : "coolingPower";
    case "volume":
      return "volume";
    case "deltaT":
      return "temperatureDifference";
    case "completeness":
      return null;
  }
}
