import { useWords } from "@features/i18n";
import { FieldRow, SelectField, TextField, WorkedOutField } from "@features/ui";
import { Caution } from "./caution";
import { fittings } from "./fittings";
import { readWalls } from "./installation-values";
import { MeasureField } from "./measure-field";
import { Section, type SectionProps, numberOf } from "./section";

export function PipeSection(props: SectionProps & { readonly correction: React.ReactNode }) {
  const t = useWords("installation");
  const { values, onChange, error, format, found } = props;
  const mm = { format, quantity: "pipeSize" } as const;
  const wallsWrong = readWalls(values.walls) === null ? t("pipe.wallsUnreadable") : null;
  const bore = found?.bore ?? null;
  const size = (value: number) => format.number(format.toDisplay(value, "pipeSize"), 4);
  return (
    <Section title={t("pipe.title")} section={props} checks={["bore"]}>
      <Caution>{t("caution.pipe")}</Caution>
      <Caution>{t("caution.lagging")}</Caution>
      <FieldRow>
        <MeasureField
          {...mm}
          label={t("pipe.circumference")}
          hint={t("pipe.circumferenceHint")}
          min={45}
          max={4100}
          {...numberOf(props, "circumferenceMm", "pipe/circumferenceMm")}
        />
        <MeasureField
          {...mm}
          label={t("pipe.outside")}
          hint={t("pipe.outsideHint")}
          min={15}
          max={1300}
          {...numberOf(props, "outsideDiameterMm", "pipe/outsideDiameterMm")}
        />
      </FieldRow>
      <TextField
        label={t("pipe.walls")}
        hint={t("pipe.wallsHint")}
        value={values.walls}
        onChange={(walls) => onChange({ walls })}
        error={wallsWrong ?? error("pipe/wallReadingsMm")}
        asRead
        autoComplete="off"
      />
      <FieldRow>
        <MeasureField
          {...mm}
          label={t("pipe.lining")}
          min={0}
          max={25}
          {...numberOf(props, "liningMm", "pipe/liningMm")}
        />
        <MeasureField
          {...mm}
          label={t("pipe.outsideUncertainty")}
          min={0.01}
          max={10}
          {...numberOf(props, "outsideUncertaintyMm", "pipe/outsideDiameterUncertaintyMm")}
        />
        <MeasureField
          {...mm}
          label={t("pipe.gaugeUncertainty")}
          min={0.001}
          max={2}
          {...numberOf(props, "gaugeUncertaintyMm", "pipe/gaugeUncertaintyMm")}
        />
      </FieldRow>
      <FieldRow>
        <WorkedOutField
          label={t("pipe.bore")}
          value={bore ? size(bore.insideDiameterMm) : null}
          unit={format.unit("pipeSize").unit}
          hint={
            bore
              ? t("pipe.boreHint", {
                  outside: format.withUnit(bore.outsideDiameterMm, "pipeSize", 4),
                  wall: format.withUnit(bore.wallMeanMm, "pipeSize", 3),
                  uncertainty: format.withUnit(2 * bore.uncertaintyMm, "pipeSize", 2),
                })
              : undefined
          }
        />
        <MeasureField
          {...mm}
          label={t("pipe.entered")}
          hint={t("pipe.enteredHint")}
          min={10}
          max={1300}
          {...numberOf(props, "enteredBoreMm", "enteredBoreMm")}
        />
      </FieldRow>
      {props.correction}
    </Section>
  );
}

export function PositionSection(props: SectionProps) {
  const t = useWords("installation");
  const words = useWords("evidence");
  const { values, onChange, error, format } = props;
  const metres = { format, quantity: "distance", min: 0, max: 500 } as const;
  return (
    <Section title={t("position.title")} section={props} checks={["straightRun"]}>
      <FieldRow>
        <MeasureField
          {...metres}
          label={t("position.upstream")}
          {...numberOf(props, "upstreamM", "straightRun/upstreamM")}
        />
        <MeasureField
          {...metres}
          label={t("position.downstream")}
          {...numberOf(props, "downstreamM", "straightRun/downstreamM")}
        />
        <SelectField
          label={t("position.fitting")}
          value={values.nearestFitting}
          options={fittings.map((value) => ({ value, label: words(`fitting.${value}`) }))}
          onChange={(nearestFitting) => onChange({ nearestFitting })}
          error={error("straightRun/nearestFitting")}
        />
      </FieldRow>
      <Caution>{t("caution.height")}</Caution>
    </Section>
  );
}
