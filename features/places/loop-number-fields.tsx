import { View } from "react-native";
import { absolutePressureMPa } from "@shared/domain/fluids/loop-fluid";
import { useWords } from "@features/i18n";
import { FieldRow, NumberField, Text, TextLink, WorkedOutField } from "@features/ui";
import { suggestedDeltaTCutOffK, suggestedFlowCutOff } from "./cut-off-suggestions";
import { errorOf, Section, SoftWarning, useNumberChange, type LoopFormProps } from "./loop-form";
import { shownRange, shownValue } from "./shown-range";

/** Gauge pressure above which the reading itself is doubtful: most fittings are rated for 16 bar. */
const DOUBTFUL_GAUGE_MPA = 1.6;

/** Usual design ΔT by service, K (common practice, no source), and what is unusual enough to ask. */
const usualDeltaTK = {
  chilled: { usual: [5, 8], odd: [3, 12] },
  hot: { usual: [10, 20], odd: [5, 40] },
} as const;

export function LoopNumberFields(props: LoopFormProps) {
  const t = useWords("places");
  return (
    <>
      <Section title={t("loop.pressureTitle")}>
        <PressureFields {...props} />
      </Section>
      <Section title={t("loop.designTitle")}>
        <DesignFields {...props} />
      </Section>
      <Section title={t("loop.cutOffTitle")}>
        <CutOffFields {...props} />
      </Section>
    </>
  );
}

function PressureFields(props: LoopFormProps) {
  const t = useWords("places");
  const { values, format } = props;
  const { change, unreadable } = useNumberChange(props);
  const unit = format.unit("pressure").unit;
  const typed = values.gaugePressure;
  const gaugeMPa = typed === null ? null : format.fromDisplay(typed, "pressure");
  const usable = !unreadable.has("gaugePressure");
  const absolute = absolutePressureMPa(gaugeMPa);
  const shown = format.number(format.toDisplay(absolute.pressureMPa, "pressure"), 2);
  return (
    <>
      <FieldRow>
        <NumberField
          label={t("loop.gaugePressure")}
          hint={t("loop.gaugePressureHint")}
          unit={unit}
          value={typed}
          onChange={change("gaugePressure")}
          {...shownRange(format, "pressure", 0, 2.5)}
          error={errorOf(props, "gaugePressure")}
        />
        <WorkedOutField
          label={t("loop.absolutePressure")}
          value={usable ? shown : null}
          unit={unit}
          hint={t(absolute.assumed ? "loop.pressureAssumed" : "loop.pressureFromGauge", {
            value: `${shown}\u00A0${unit}`,
          })}
        />
      </FieldRow>
      {usable && gaugeMPa !== null && gaugeMPa > DOUBTFUL_GAUGE_MPA ? (
        <SoftWarning>
          {t("loop.pressureDoubtful", {
            limit: format.withUnit(DOUBTFUL_GAUGE_MPA, "pressure", 0),
          })}
        </SoftWarning>
      ) : null}
    </>
  );
}

function DesignFields(props: LoopFormProps) {
  const t = useWords("places");
  const { values, format } = props;
  const { change } = useNumberChange(props);
  const usual =
    values.service === "chilled" || values.service === "hot" ? usualDeltaTK[values.service] : null;
  const range = ([low, high]: readonly [number, number]) =>
    t("form.range", {
      low: format.number(format.toDisplay(low, "temperatureDifference"), 0),
      high: format.withUnit(high, "temperatureDifference", 0),
    });
  const deltaTK =
    values.designDeltaT === null
      ? null
      : format.fromDisplay(values.designDeltaT, "temperatureDifference");
  const odd =
    usual !== null && deltaTK !== null && (deltaTK < usual.odd[0] || deltaTK > usual.odd[1]);
  return (
    <>
      <FieldRow>
        <NumberField
          label={t("loop.designFlow")}
          hint={t("form.optional")}
          unit={format.unit("flow").unit}
          value={values.designFlow}
          onChange={change("designFlow")}
          {...shownRange(format, "flow", 0.001, 10_000)}
          error={errorOf(props, "designFlow")}
        />
        <NumberField
          label={t("loop.designDeltaT")}
          hint={
            usual === null ? t("form.optional") : t("loop.usual", { range: range(usual.usual) })
          }
          unit={format.unit("temperatureDifference").unit}
          value={values.designDeltaT}
          onChange={change("designDeltaT")}
          {...shownRange(format, "temperatureDifference", 1, 40)}
          error={errorOf(props, "designDeltaT")}
        />
      </FieldRow>
      {odd && usual !== null ? (
        <SoftWarning>{t("loop.deltaTOdd", { range: range(usual.usual) })}</SoftWarning>
      ) : null}
    </>
  );
}

function CutOffFields(props: LoopFormProps) {
  const t = useWords("places");
  const { values, format, onChange, onReadable } = props;
  const { change } = useNumberChange(props);
  const designFlow =
    values.designFlow === null ? null : format.fromDisplay(values.designFlow, "flow");
  const flow = suggestedFlowCutOff(designFlow);
  const deltaTK = values.service === null ? null : suggestedDeltaTCutOffK(values.service);
  const use = (field: "flowCutOff" | "deltaTCutOff", value: number | null) => {
    onChange({ [field]: value });
    onReadable(field, true);
  };
  const rounded = (value: number | null) => (value === null ? null : Number(value.toPrecision(2)));
  return (
    <>
      <Text tone="ink2">{t("loop.cutOffWhy")}</Text>
      {values.service === "changeover" ? <Text tone="ink2">{t("loop.cutOffBand")}</Text> : null}
      <FieldRow>
        <View style={{ gap: 6 }}>
          <NumberField
            label={t("loop.flowCutOff")}
            hint={t("loop.cutOffNone")}
            unit={format.unit("flow").unit}
            value={values.flowCutOff}
            onChange={change("flowCutOff")}
            {...shownRange(format, "flow", 0, 1000)}
            error={errorOf(props, "flowCutOff")}
          />
          <Suggestion
            why={flow === null ? t("loop.flowCutOffNoDesign") : t("loop.flowCutOffWhy")}
            label={
              flow === null ? null : t("loop.use", { value: format.withUnit(flow, "flow", 2) })
            }
            onUse={() => use("flowCutOff", rounded(shownValue(format, "flow", flow)))}
          />
        </View>
        <View style={{ gap: 6 }}>
          <NumberField
            label={t("loop.deltaTCutOff")}
            hint={t("loop.cutOffNone")}
            unit={format.unit("temperatureDifference").unit}
            value={values.deltaTCutOff}
            onChange={change("deltaTCutOff")}
            {...shownRange(format, "temperatureDifference", 0, 10)}
            error={errorOf(props, "deltaTCutOff")}
          />
          <Suggestion
            why={deltaTK === null ? t("loop.deltaTCutOffNoService") : t("loop.deltaTCutOffWhy")}
            label={
              deltaTK === null
                ? null
                : t("loop.use", { value: format.withUnit(deltaTK, "temperatureDifference", 1) })
            }
            onUse={() =>
              use("deltaTCutOff", rounded(shownValue(format, "temperatureDifference", deltaTK)))
            }
          />
        </View>
      </FieldRow>
    </>
  );
}

function Suggestion(props: { why: string; label: string | null; onUse: () => void }) {
  return (
    <View style={{ gap: 4 }}>
      <Text variant="small" tone="ink2">
        {props.why}
      </Text>
      {props.label === null ? null : <TextLink label={props.label} onPress={props.onUse} />}
    </View>
  );
}
