import { useFormat, useWords } from "@features/i18n";
import { ChoiceTiles, FieldRow, NumberField, SelectField } from "@features/ui";
import type { SideValues } from "./comparison-values";

/** How well a meter is known: by the point's evidence, by its class, or as somebody states. */
export function ClaimFields(props: {
  value: SideValues;
  claims: readonly SideValues["claim"][];
  onChange: (changed: Partial<SideValues>) => void;
  errorOf: (field: string) => string | null;
}) {
  const t = useWords("compare");
  const { value, onChange } = props;
  return (
    <>
      <ChoiceTiles
        label={t("claim.label")}
        value={value.claim}
        choices={props.claims.map((claim) => ({
          value: claim,
          label: t(`claim.${claim}`),
          detail: t(`claim.${claim}Detail`),
        }))}
        onChange={(claim) => onChange({ claim })}
      />
      {value.claim === "class" ? <ClassFields {...props} /> : null}
      {value.claim === "stated" ? <StatedFields {...props} /> : null}
    </>
  );
}

type ClaimProps = Parameters<typeof ClaimFields>[0];

function ClassFields({ value, onChange, errorOf }: ClaimProps) {
  const t = useWords("compare");
  const format = useFormat();
  return (
    <>
      <FieldRow>
        <SelectField
          label={t("claim.meterClass")}
          value={value.meterClass}
          options={(["1", "2", "3"] as const).map((one) => ({ value: one, label: one }))}
          onChange={(meterClass) => onChange({ meterClass })}
          required
        />
        <NumberField
          label={t("claim.flowRatio")}
          hint={t("claim.flowRatioHint")}
          unit="× qp"
          value={value.flowRatio}
          onChange={(flowRatio) => onChange({ flowRatio })}
          min={0}
          max={2}
          error={errorOf("claim/flowRatio")}
          required
        />
      </FieldRow>
      <FieldRow>
        <NumberField
          label={t("claim.meanDeltaT")}
          hint={t("claim.meanDeltaTHint")}
          unit="K"
          value={value.meanDeltaTK}
          onChange={(meanDeltaTK) => onChange({ meanDeltaTK })}
          min={0}
          max={150}
          error={errorOf("claim/meanDeltaTK")}
          required
        />
        <NumberField
          label={t("claim.deltaTMin")}
          unit="K"
          value={value.deltaTMinK}
          onChange={(deltaTMinK) => onChange({ deltaTMinK })}
          min={0}
          max={20}
          error={errorOf("claim/deltaTMinK")}
          required
        />
      </FieldRow>
      <SelectField
        label={t("claim.flowCap")}
        hint={t("claim.flowCapHint")}
        value={value.flowCap}
        options={(["5", "3.5"] as const).map((cap) => ({
          value: cap,
          label: t("claim.cap", { percent: format.number(Number(cap), cap === "5" ? 0 : 1) }),
        }))}
        onChange={(flowCap) => onChange({ flowCap })}
      />
    </>
  );
}

function StatedFields({ value, onChange, errorOf }: ClaimProps) {
  const t = useWords("compare");
  const withVolume = value.kind === "point" || value.hasVolume;
  const withDeltaT = value.kind === "point" || value.deltaTK !== null;
  return (
    <>
      <NumberField
        label={t("typed.expanded")}
        hint={t("typed.blank")}
        unit="%"
        value={value.expandedPercent}
        onChange={(expandedPercent) => onChange({ expandedPercent })}
        min={0}
        max={100}
        error={errorOf("claim/expandedPercent")}
      />
      {withVolume || withDeltaT ? (
        <FieldRow>
          {withVolume ? (
            <NumberField
              label={t("typed.volumePercent")}
              unit="%"
              value={value.volumePercent}
              onChange={(volumePercent) => onChange({ volumePercent })}
              min={0}
              max={100}
              error={errorOf("claim/volumePercent")}
            />
          ) : null}
          {withDeltaT ? (
            <NumberField
              label={t("typed.deltaTPercent")}
              unit="%"
              value={value.deltaTPercent}
              onChange={(deltaTPercent) => onChange({ deltaTPercent })}
              min={0}
              max={100}
              error={errorOf("claim/deltaTPercent")}
            />
          ) : null}
        </FieldRow>
      ) : null}
    </>
  );
}
