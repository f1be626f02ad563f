import { kitPaths } from "@features/kit/kit-paths";
import { useEvidenceWords, useWords } from "@features/i18n";
import {
  ChoiceTiles,
  FieldRow,
  NumberField,
  SelectField,
  Text,
  TextField,
  TextLink,
  WorkedOutField,
} from "@features/ui";
import { Caution } from "./caution";
import { NONE, type MeterClassChoice } from "./installation-values";
import { MeasureField } from "./measure-field";
import { Section, type SectionProps, numberOf, choices } from "./section";

export function MeterSection(props: SectionProps) {
  const t = useWords("installation");
  const { values, onChange, error, kit, format, found } = props;
  const none = { value: NONE, label: t("notSaid") };
  const corrected = found?.correctedFlowLPerS ?? null;
  return (
    <Section
      title={t("meter.title")}
      section={props}
      checks={["certificate", "velocity", "reynolds"]}
    >
      <SelectField
        label={t("meter.meter")}
        value={values.flowMeterId}
        options={[none, ...choices(kit, ["flowMeter", "permanentMeter"], values.flowMeterId)]}
        onChange={(flowMeterId) => onChange({ flowMeterId })}
        error={error("flowMeterId")}
      />
      <TextLink variant="small" label={t("meter.toKit")} href={kitPaths.kit} />
      <FieldRow>
        <NumberField
          label={t("meter.shown")}
          hint={t("meter.shownHint")}
          unit="L/s"
          min={-10000}
          max={10000}
          {...numberOf(props, "shownFlowLPerS", "shownFlowLPerS")}
        />
        {corrected === null ? null : (
          <WorkedOutField
            label={t("meter.corrected")}
            value={format.number(corrected, 4)}
            unit="L/s"
            hint={t("meter.correctedHint", {
              percent: format.number(100 * ((found?.bore?.flowFactor ?? 1) - 1), 4),
            })}
          />
        )}
      </FieldRow>
      <FieldRow>
        <NumberField
          label={t("meter.drift")}
          hint={t("meter.driftHint")}
          unit="%"
          min={0}
          max={10}
          {...numberOf(props, "flowDriftPercent", "flowDriftPercent")}
        />
        <NumberField
          label={t("meter.step")}
          unit="L/s"
          min={0}
          max={100}
          {...numberOf(props, "flowStepLPerS", "flowStepLPerS")}
        />
        <NumberField
          label={t("meter.remount")}
          hint={t("meter.remountHint")}
          unit="%"
          min={0}
          max={50}
          {...numberOf(props, "remountPercent", "remountPercent")}
        />
      </FieldRow>
    </Section>
  );
}

/** A permanent heat meter that gives power or energy by itself: what its plate says. */
export function PlateSection(props: SectionProps) {
  const t = useWords("installation");
  const { values, onChange, error, format, found } = props;
  const words = useEvidenceWords(format);
  const plate = found?.plateTerm ?? null;
  const classes: readonly MeterClassChoice[] = [NONE, "1", "2", "3"];
  return (
    <Section title={t("plate.title")} section={props}>
      <Text tone="ink2">{t("plate.lead")}</Text>
      <FieldRow>
        <SelectField
          label={t("plate.class")}
          hint={t("plate.classHint")}
          value={values.meterClass}
          options={classes.map((value) => ({
            value,
            label: value === NONE ? t("notSaid") : value,
          }))}
          onChange={(meterClass) => onChange({ meterClass })}
          error={error("meterPlate/accuracyClass")}
        />
        {values.meterClass === NONE ? null : (
          <NumberField
            label={t("plate.flow")}
            unit="m³/h"
            min={0}
            max={10000}
            {...numberOf(props, "permanentFlowM3PerHour", "meterPlate/permanentFlowM3PerHour")}
          />
        )}
        {values.meterClass === NONE ? null : (
          <NumberField
            label={t("plate.deltaT")}
            unit="K"
            min={0}
            max={20}
            {...numberOf(props, "minimumDeltaTK", "meterPlate/minimumDeltaTK")}
          />
        )}
      </FieldRow>
      {values.meterClass === NONE ? null : (
        <>
          <FieldRow>
            <TextField
              label={t("plate.certificate")}
              hint={t("plate.certificateHint")}
              value={values.meterCertificate}
              onChange={(meterCertificate) => onChange({ meterCertificate })}
              error={error("meterPlate/certificate/number")}
              asRead
              autoComplete="off"
            />
            <NumberField
              label={t("plate.expanded")}
              unit="%"
              min={0}
              max={100}
              {...numberOf(
                props,
                "meterCertificatePercent",
                "meterPlate/certificate/expandedPercent",
              )}
            />
            <NumberField
              label={t("plate.k")}
              hint={t("plate.kHint")}
              min={1}
              max={4}
              {...numberOf(props, "meterCertificateK", "meterPlate/certificate/k")}
            />
          </FieldRow>
          {plate === null ? null : (
            <WorkedOutField
              label={t("plate.result")}
              value={`± ${format.number(plate.expandedPercent, 2)}`}
              unit="%"
              hint={words.origin(plate.term.origin)}
            />
          )}
        </>
      )}
    </Section>
  );
}

export function ZeroSection(props: SectionProps) {
  const t = useWords("installation");
  const { values, onChange, format, found } = props;
  const speed = { format, quantity: "velocity" } as const;
  const zero = found?.zeroLPerS ?? null;
  return (
    <Section title={t("zero.title")} section={props} checks={["zero"]}>
      <Caution>{t("caution.stop")}</Caution>
      <ChoiceTiles
        label={t("zero.stopped")}
        value={values.flowStopped}
        columns={2}
        choices={[
          { value: "yes", label: t("zero.yes"), detail: t("zero.yesDetail") },
          { value: "no", label: t("zero.no"), detail: t("zero.noDetail") },
        ]}
        onChange={(flowStopped) => onChange({ flowStopped })}
      />
      {values.flowStopped === null ? null : (
        <>
          <FieldRow>
            <MeasureField
              {...speed}
              label={t("zero.reading")}
              min={-1}
              max={1}
              {...numberOf(props, "zeroReadingMPerS", "zero/readingMPerS")}
            />
            <SelectField
              label={t("zero.action")}
              value={values.zeroAction}
              options={(["none", "setOnMeter", "corrected"] as const).map((value) => ({
                value,
                label: t(`zero.actions.${value}`),
              }))}
              onChange={(zeroAction) => onChange({ zeroAction })}
            />
            <MeasureField
              {...speed}
              label={t("zero.remaining")}
              hint={t("zero.remainingHint")}
              min={0}
              max={1}
              {...numberOf(props, "zeroRemainingMPerS", "zero/remainingMPerS")}
            />
          </FieldRow>
          {zero === null ? null : (
            <WorkedOutField
              label={t("zero.asFlow")}
              value={format.number(zero, 5)}
              unit="L/s"
              hint={t("zero.asFlowHint")}
            />
          )}
        </>
      )}
    </Section>
  );
}

export function SoundSection(props: SectionProps) {
  const t = useWords("installation");
  const { format } = props;
  return (
    <Section title={t("sound.title")} section={props} checks={["soundSpeed"]}>
      <FieldRow>
        <MeasureField
          format={format}
          quantity="velocity"
          label={t("sound.displayed")}
          min={1000}
          max={2000}
          {...numberOf(props, "soundSpeedMPerS", "soundSpeed/displayedMPerS")}
        />
        <MeasureField
          format={format}
          quantity="temperature"
          label={t("sound.fluidC")}
          hint={t("sound.fluidHint")}
          min={-20}
          max={150}
          {...numberOf(props, "fluidC", "soundSpeed/fluidC")}
        />
      </FieldRow>
    </Section>
  );
}
