import { useWords } from "@features/i18n";
import {
  CheckField,
  ChoiceTiles,
  FieldGroup,
  FieldRow,
  NumberField,
  TextField,
} from "@features/ui";
import type { StandInValues } from "./comparison-values";

/** An outage of a meter, and what the portable measured of it. */
export function StandInFields(props: {
  on: boolean;
  onToggle: (on: boolean) => void;
  value: StandInValues;
  onChange: (value: StandInValues) => void;
  errorOf: (field: string) => string | null;
  consentError: string | null;
}) {
  const t = useWords("compare");
  const { value, errorOf } = props;
  const set = (changed: Partial<StandInValues>) => props.onChange({ ...value, ...changed });
  const percent = (field: "coveredPercent" | "estimatePercent", hint?: string) => (
    <NumberField
      label={t(`standIn.${field}`)}
      hint={hint}
      unit="%"
      value={value[field]}
      onChange={(typed) => set({ [field]: typed })}
      min={0}
      max={100}
      error={errorOf(field)}
    />
  );
  return (
    <FieldGroup title={t("standIn.title")}>
      <CheckField
        label={t("standIn.add")}
        hint={t("standIn.addHint")}
        checked={props.on}
        onChange={props.onToggle}
      />
      {props.on ? (
        <>
          <FieldRow>
            <NumberField
              label={t("standIn.outage")}
              unit="h"
              value={value.outageHours}
              onChange={(outageHours) => set({ outageHours })}
              min={0}
              error={errorOf("outageHours")}
              required
            />
            <NumberField
              label={t("standIn.covered")}
              unit="h"
              value={value.coveredHours}
              onChange={(coveredHours) => set({ coveredHours })}
              min={0}
              error={errorOf("coveredHours")}
              required
            />
          </FieldRow>
          <FieldRow>
            <NumberField
              label={t("standIn.coveredKwh")}
              unit="kWh"
              value={value.coveredKwh}
              onChange={(coveredKwh) => set({ coveredKwh })}
              min={0}
              error={errorOf("coveredKwh")}
              required
            />
            {percent("coveredPercent", t("typed.blank"))}
          </FieldRow>
          <ChoiceTiles
            label={t("standIn.scale")}
            value={value.byDegreeHours ? "degreeHours" : "time"}
            choices={[
              { value: "degreeHours", label: t("standIn.byDegreeHours") },
              { value: "time", label: t("standIn.byTime") },
            ]}
            onChange={(scale) => set({ byDegreeHours: scale === "degreeHours" })}
          />
          {value.byDegreeHours ? (
            <FieldRow>
              <NumberField
                label={t("standIn.coveredKh")}
                unit="K·h"
                value={value.coveredKh}
                onChange={(coveredKh) => set({ coveredKh })}
                min={0}
                error={errorOf("degreeHours/covered")}
                required
              />
              <NumberField
                label={t("standIn.missingKh")}
                unit="K·h"
                value={value.missingKh}
                onChange={(missingKh) => set({ missingKh })}
                min={0}
                error={errorOf("degreeHours/missing")}
                required
              />
            </FieldRow>
          ) : null}
          {percent("estimatePercent", t("standIn.estimateHint"))}
          <CheckField
            label={t("standIn.consent")}
            checked={value.hasConsent}
            onChange={(hasConsent) => set({ hasConsent })}
          />
          {value.hasConsent ? (
            <TextField
              label={t("standIn.consentBy")}
              value={value.consentBy}
              onChange={(consentBy) => set({ consentBy })}
              error={props.consentError ?? errorOf("consentBy")}
              autoComplete="off"
              required
            />
          ) : null}
        </>
      ) : null}
    </FieldGroup>
  );
}
