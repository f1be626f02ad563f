import { useWords } from "@features/i18n";
import { Banner, ChoiceTiles, FieldRow, NumberField } from "@features/ui";
import { errorOf, useNumberChange, type LoopFormProps } from "./loop-form";

/** What fills the loop. Glycol is refused as water: it carries less heat. */
export function FluidFields(props: LoopFormProps) {
  const t = useWords("places");
  const { values, onChange, loop } = props;
  const { change } = useNumberChange(props);
  const glycol = values.fluidKind !== "water";
  return (
    <>
      <ChoiceTiles
        label={t("fluid.kind")}
        value={values.fluidKind}
        columns={3}
        choices={[
          { value: "water", label: t("fluid.water") },
          { value: "propyleneGlycol", label: t("fluid.propyleneGlycol") },
          { value: "ethyleneGlycol", label: t("fluid.ethyleneGlycol") },
        ]}
        onChange={(fluidKind) => onChange({ fluidKind })}
        error={errorOf(props, "fluidKind")}
      />
      {glycol ? (
        <>
          <FieldRow>
            <NumberField
              label={t("fluid.percent")}
              hint={t("fluid.percentHint")}
              unit="%"
              value={values.glycolPercent}
              onChange={change("glycolPercent")}
              min={1}
              max={60}
              error={errorOf(props, "glycolPercent")}
              required
            />
            <ChoiceTiles
              label={t("fluid.basis")}
              value={values.glycolBasis}
              columns={2}
              choices={[
                { value: "mass", label: t("fluid.mass") },
                { value: "volume", label: t("fluid.volume") },
              ]}
              onChange={(glycolBasis) => onChange({ glycolBasis })}
              error={errorOf(props, "glycolBasis")}
              required
            />
          </FieldRow>
          <Banner kind="look" lead={t("fluid.blockedLead")}>
            {t(loop?.hasReadings ? "fluid.blockedWithReadings" : "fluid.blocked")}
          </Banner>
        </>
      ) : null}
    </>
  );
}
