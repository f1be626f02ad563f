import { useMemo } from "react";
import { ASSUMED_OCCUPIED_HOURS, clockOfMinute } from "@shared/domain/analysis/occupied-hours";
import type { Site } from "@shared/contracts/places";
import { useFormat, useWords } from "@features/i18n";
import { ChoiceTiles, Form, TextField } from "@features/ui";
import { OccupiedFields, type OccupiedValues } from "./occupied-fields";
import { knownCurrencies, knownZones } from "./known-zones";
import { SearchPicker } from "./search-picker";
import type { SaveErrors } from "./use-save";

export interface SiteValues extends OccupiedValues {
  readonly name: string;
  readonly address: string;
  readonly zone: string | null;
  readonly currency: string | null;
  readonly unitSystem: "si" | "inchPound" | null;
}

export const siteFields = [
  "name",
  "address",
  "zone",
  "currency",
  "unitSystem",
  "occupiedHours",
  "occupiedHours/end",
] as const;

export function siteValues(site: Site | null, deviceZone: string): SiteValues {
  return {
    name: site?.name ?? "",
    address: site?.address ?? "",
    zone: site?.zone ?? deviceZone,
    currency: site?.currency ?? null,
    unitSystem: site?.unitSystem ?? "si",
    weekdays: site?.occupiedHours.weekdays ?? ASSUMED_OCCUPIED_HOURS.weekdays,
    occupiedFrom: site?.occupiedHours.start ?? clockOfMinute(ASSUMED_OCCUPIED_HOURS.startMinute),
    occupiedTo: site?.occupiedHours.end ?? clockOfMinute(ASSUMED_OCCUPIED_HOURS.endMinute),
  };
}

/**
 * The hours to send; undefined leaves them as they are, so that hours nobody touched stay assumed.
 */
export function occupiedHoursOf(values: SiteValues, site: Site | null, deviceZone: string) {
  const before = siteValues(site, deviceZone);
  const { occupiedFrom: start, occupiedTo: end } = values;
  const same =
    start === before.occupiedFrom &&
    end === before.occupiedTo &&
    values.weekdays.join() === before.weekdays.join();
  return same ? undefined : { weekdays: [...values.weekdays], start, end };
}

export type SiteProblems = Partial<Record<keyof SiteValues, string>>;

/** The fields of a site. Its zone decides where days begin, so changing it is explained. */
export function SiteForm(props: {
  label: string;
  values: SiteValues;
  onChange: (changes: Partial<SiteValues>) => void;
  onSubmit: () => void;
  problems: SiteProblems;
  errors: SaveErrors;
  /** The zone stored now, where the site exists and has readings to rebuild. */
  storedZone: string | null;
  /** Nobody has set the occupied hours yet. */
  hoursAssumed: boolean;
}) {
  const t = useWords("places");
  const { language } = useFormat();
  const zones = useMemo(() => knownZones(), []);
  const currencies = useMemo(() => knownCurrencies(language), [language]);
  const { values, onChange, problems, errors, storedZone } = props;
  const error = (name: keyof SiteValues) => errors.field(name) ?? problems[name] ?? null;
  const moved = storedZone !== null && values.zone !== storedZone;
  return (
    <Form label={props.label} onSubmit={props.onSubmit} errors={errors.form}>
      <TextField
        label={t("site.name")}
        value={values.name}
        onChange={(name) => onChange({ name })}
        error={error("name")}
        required
        autoComplete="off"
      />
      <TextField
        label={t("site.address")}
        value={values.address}
        onChange={(address) => onChange({ address })}
        error={error("address")}
        hint={t("form.optional")}
        autoComplete="off"
      />
      <SearchPicker
        label={t("site.zone")}
        searchLabel={t("site.zoneSearch")}
        hint={moved ? t("site.zoneMoved") : t("site.zoneHint")}
        value={values.zone}
        picks={zones}
        onChange={(zone) => onChange({ zone })}
        error={error("zone")}
      />
      <SearchPicker
        label={t("site.currency")}
        searchLabel={t("site.currencySearch")}
        hint={t("site.currencyHint")}
        value={values.currency}
        picks={currencies}
        onChange={(currency) => onChange({ currency })}
        error={error("currency")}
      />
      <ChoiceTiles
        label={t("site.units")}
        hint={t("site.unitsHint")}
        value={values.unitSystem}
        columns={2}
        choices={[
          { value: "si", label: t("units.si"), detail: t("units.siDetail") },
          { value: "inchPound", label: t("units.inchPound"), detail: t("units.inchPoundDetail") },
        ]}
        onChange={(unitSystem) => onChange({ unitSystem })}
        error={error("unitSystem")}
      />
      <OccupiedFields
        values={values}
        onChange={onChange}
        assumed={props.hoursAssumed}
        error={
          errors.field("occupiedHours") ??
          errors.field("occupiedHours/end") ??
          problems.occupiedTo ??
          null
        }
      />
    </Form>
  );
}
