import { useMemo } from "react";

import type { UnitSystem } from "@shared/domain/units/display-units";
import { makeFormat, type Format } from "@shared/formats/format";

import { usePreferences } from "./preferences";

/**
 * How values are written for the person at this screen.
 *
 * @param zone IANA zone of the site; times of people and accounts use the device's own.
 * @param siteUnits unit system of the site, used where the account follows the site.
 * @param today the site's day: dates of another year are then written with it.
 */
export function useFormat(zone?: string, siteUnits?: UnitSystem, today?: string): Format {
  const { language, unitSystem: own } = usePreferences();
  const unitSystem = own ?? siteUnits ?? "si";
  return useMemo(() => {
    const place = zone ?? Intl.DateTimeFormat().resolvedOptions().timeZone;
    return makeFormat(language, unitSystem, place, today);
  }, [language, unitSystem, zone, today]);
}
