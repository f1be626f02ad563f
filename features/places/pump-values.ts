import type { PumpFields } from "@shared/contracts/shape";
import type { Format } from "@features/i18n";
import { shownValue, storedValue } from "./shown-range";

/** A pump's fields as typed: numbers in the units shown, null while empty. */
export interface PumpValues {
  readonly controlledHead: "yes" | "no" | null;
  readonly staticHead: number | null;
  readonly designHead: number | null;
  readonly designFlow: number | null;
  readonly efficiencyPercent: number | null;
  readonly minimumFlow: number | null;
  readonly price: number | null;
}

export function pumpValues(pump: PumpFields | null, format: Format): PumpValues {
  return {
    controlledHead: pump === null ? null : pump.controlledHead ? "yes" : "no",
    staticHead: shownValue(format, "distance", pump?.staticHeadM ?? null),
    designHead: shownValue(format, "distance", pump?.designHeadM ?? null),
    designFlow: shownValue(format, "flow", pump?.designFlowM3PerHour ?? null),
    efficiencyPercent: pump?.efficiency == null ? null : percentOf(pump.efficiency),
    minimumFlow: shownValue(format, "flow", pump?.minimumFlowM3PerHour ?? null),
    price: pump?.pricePerKwh == null ? null : Number(pump.pricePerKwh),
  };
}

/** What is sent; whether head stays has been answered by then. */
export function pumpBody(values: PumpValues, pump: PumpFields | null, format: Format): PumpFields {
  const controlledHead = values.controlledHead === "yes";
  const stored = (
    quantity: "distance" | "flow",
    typed: number | null,
    before: number | null | undefined,
  ) => storedValue(format, quantity, typed, before ?? null);
  return {
    controlledHead,
    staticHeadM: controlledHead ? stored("distance", values.staticHead, pump?.staticHeadM) : null,
    designHeadM: stored("distance", values.designHead, pump?.designHeadM),
    designFlowM3PerHour: stored("flow", values.designFlow, pump?.designFlowM3PerHour),
    efficiency: values.efficiencyPercent === null ? null : values.efficiencyPercent / 100,
    minimumFlowM3PerHour: stored("flow", values.minimumFlow, pump?.minimumFlowM3PerHour),
    pricePerKwh: values.price === null ? null : priceText(values.price),
  };
}

/** 0.58 is 58, not 57.99999999999999. */
function percentOf(share: number): number {
  return Number((share * 100).toPrecision(10));
}

/** With a decimal point and no more decimals than a price is kept with. */
function priceText(price: number): string {
  return price.toFixed(6).replace(/0+$/, "").replace(/\.$/, "");
}
