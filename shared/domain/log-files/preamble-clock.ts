import type { LoggerClock } from "./recipe";

const LABELS = [
  "time zone",
  "timezone",
  "time-zone",
  "utc offset",
  "zeitzone",
  "fuseau horaire",
  "gmt offset",
  "clock",
];

/**
 * The logger's clock where a line above the header names it: `Time zone: UTC+1`, `Zeitzone;GMT`,
 * `Timezone,Europe/Paris`. Null where none does.
 */
export function preambleClock(
  preamble: readonly { readonly label: string; readonly value: string }[],
): LoggerClock | null {
  for (const { label, value } of preamble) {
    if (!LABELS.includes(label.toLowerCase().trim())) continue;
    const clock = clockOf(value.trim());
    if (clock !== null) return clock;
  }
  return null;
}

const OFFSET = /^(?:UTC|GMT)? ?([+-])(\d{1,2})(?::?(\d{2}))?$/i;
const ZONE_NAME = /^[A-Za-z]{2,20}\/[A-Za-z_]{2,30}$/;

function clockOf(value: string): LoggerClock | null {
  if (value.length > 60) return null;
  const upper = value.toUpperCase();
  if (upper === "UTC" || upper === "GMT" || upper === "Z") return { kind: "utc" };
  const offset = OFFSET.exec(value);
  if (offset !== null) {
    const minutes = Number(offset[2]) * 60 + Number(offset[3] ?? "0");
    return { kind: "fixedOffset", offsetMinutes: offset[1] === "-" ? -minutes : minutes };
  }
  return ZONE_NAME.test(value) ? { kind: "zone", zone: value } : null;
}
