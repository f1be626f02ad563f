import type { Pick } from "./search-picker";

/** “UTC+2” as it is now; zones change their offset with the season, so it is only a hint. */
function offsetNow(zone: string, atMs: number): string {
  const parts = new Intl.DateTimeFormat("en", {
    timeZone: zone,
    timeZoneName: "shortOffset",
  }).formatToParts(atMs);
  const name = parts.find((part) => part.type === "timeZoneName")?.value ?? "";
  return name === "GMT" ? "UTC" : name.replace("GMT", "UTC").replace("-", "\u2212");
}

let zones: readonly Pick[] | null = null;

/** Every IANA zone this device knows, with its offset today. Made once: it takes some 50 ms. */
export function knownZones(): readonly Pick[] {
  if (zones !== null) return zones;
  const now = Date.now();
  const names = ["UTC", ...Intl.supportedValuesOf("timeZone").filter((name) => name !== "UTC")];
  zones = names.map((value) => ({
    value,
    label: value.replace(/_/g, " "),
    detail: offsetNow(value, now),
    also: value,
  }));
  return zones;
}

/** Currencies of ISO 4217 this device has a name for. */
export function knownCurrencies(language: string): readonly Pick[] {
  const names = new Intl.DisplayNames([language], { type: "currency" });
  return Intl.supportedValuesOf("currency").map((value) => ({
    value,
    label: value,
    detail: names.of(value) ?? "",
  }));
}
