import { fluidFacts } from "@shared/domain/fluids/fluid-facts";
import { glycolTestMethod, type GlycolTestMethod } from "@shared/contracts/places";
import { useWords } from "@features/i18n";
import {
  ChoiceTiles,
  DateField,
  FieldRow,
  NumberField,
  SelectField,
  WorkedOutField,
} from "@features/ui";
import { errorOf, SoftWarning, useNumberChange, type LoopFormProps } from "./loop-form";
import { NONE } from "./loop-values";

/** What fills the loop; of glycol how much, since when that is known, and what follows from it. */
export function FluidFields(props: LoopFormProps) {
  const t = useWords("places");
  const { values, onChange } = props;
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
      {values.fluidKind === "water" ? null : (
        <>
          <PercentFields {...props} />
          <MixtureFacts {...props} />
          <TestFields {...props} />
        </>
      )}
    </>
  );
}

function PercentFields(props: LoopFormProps) {
  const t = useWords("places");
  const { values, onChange } = props;
  const { change } = useNumberChange(props);
  return (
    <FieldRow>
      <NumberField
        label={t("fluid.percent")}
        hint={t("fluid.percentHint")}
        unit="%"
        value={values.glycolPercent}
        onChange={change("glycolPercent")}
        min={0.1}
        max={100}
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
  );
}

/** The other percentage and the freezing point, as soon as both are said. */
function MixtureFacts({ values, format }: LoopFormProps) {
  const t = useWords("places");
  const { fluidKind: kind, glycolPercent: percent, glycolBasis: basis } = values;
  if (kind === "water" || percent === null || basis === null) return null;
  const gaugeMPa =
    values.gaugePressure === null ? null : format.fromDisplay(values.gaugePressure, "pressure");
  // The pressure has its own field and message: here only the mixture counts.
  const facts =
    fluidFacts({ kind, percent, basis }, gaugeMPa) ?? fluidFacts({ kind, percent, basis }, null);
  if (facts === null) return <SoftWarning>{t("fluid.outOfTables")}</SoftWarning>;
  const other = basis === "mass" ? "volume" : "mass";
  const temperature = (celsius: number) => format.withUnit(celsius, "temperature", 1);
  return (
    <>
      <FieldRow>
        <WorkedOutField
          label={t(`fluid.otherBasis.${other}`)}
          value={format.number(facts[`${other}Percent`], 1)}
          unit="%"
          hint={t("fluid.otherBasisHint")}
        />
        <WorkedOutField
          label={t("fluid.freezes")}
          value={format.number(format.toDisplay(facts.freezesAtC, "temperature"), 1)}
          unit={format.unit("temperature").unit}
          hint={t("fluid.freezesHint", {
            lowest: temperature(facts.lowestC),
            highest: temperature(facts.highestC),
          })}
        />
      </FieldRow>
      {facts.interpolated ? <SoftWarning>{t("fluid.interpolated")}</SoftWarning> : null}
    </>
  );
}

function TestFields(props: LoopFormProps) {
  const t = useWords("places");
  const { values, onChange } = props;
  return (
    <FieldRow>
      <DateField
        label={t("fluid.testedOn")}
        hint={t("fluid.testedOnHint")}
        value={values.glycolTestedOn}
        onChange={(glycolTestedOn) => onChange({ glycolTestedOn })}
        error={errorOf(props, "glycolTestedOn")}
      />
      <SelectField<GlycolTestMethod | typeof NONE>
        label={t("fluid.testMethod")}
        value={values.glycolTestMethod ?? NONE}
        options={[
          { value: NONE, label: t("fluid.testMethodNone") },
          ...glycolTestMethod.options.map((method) => ({
            value: method,
            label: t(`fluid.testMethodIs.${method}`),
          })),
        ]}
        onChange={(method) => onChange({ glycolTestMethod: method === NONE ? null : method })}
        error={errorOf(props, "glycolTestMethod")}
      />
    </FieldRow>
  );
}
