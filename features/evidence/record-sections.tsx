import { useWords } from "@features/i18n";
import { DateField, FieldRow, NumberField, SelectField, Text, TextField } from "@features/ui";
import { Caution } from "./caution";
import { ClockFields } from "./clock-fields";
import { EditFields } from "./edit-fields";
import { NONE } from "./installation-values";
import { MeasureField } from "./measure-field";
import { Section, type SectionProps, numberOf, choices } from "./section";

export function TimeSection(props: SectionProps) {
  const t = useWords("installation");
  const { values, onChange, error } = props;
  return (
    <Section title={t("time.title")} section={props}>
      <Text tone="ink2">{t("time.lead")}</Text>
      <FieldRow>
        <DateField
          label={t("time.startDate")}
          value={values.startDate}
          onChange={(startDate) => onChange({ startDate })}
          error={error("startsAt")}
          required
        />
        <TextField
          label={t("time.startTime")}
          hint={t("time.timeHint")}
          value={values.startTime}
          onChange={(startTime) => onChange({ startTime })}
          asRead
          autoComplete="off"
        />
        <DateField
          label={t("time.endDate")}
          hint={t("time.endHint")}
          value={values.endDate}
          onChange={(endDate) => onChange({ endDate })}
          error={error("endsAt")}
        />
        <TextField
          label={t("time.endTime")}
          value={values.endTime}
          onChange={(endTime) => onChange({ endTime })}
          asRead
          autoComplete="off"
        />
      </FieldRow>
      <Caution>{t("caution.open")}</Caution>
    </Section>
  );
}

export function LoggerSection(props: SectionProps) {
  const t = useWords("installation");
  const { values, onChange, error, kit } = props;
  return (
    <Section title={t("logger.title")} section={props} checks={["clock"]}>
      <SelectField
        label={t("logger.logger")}
        value={values.loggerId}
        options={[
          { value: NONE, label: t("notSaid") },
          ...choices(kit, ["logger", "permanentMeter"], values.loggerId),
        ]}
        onChange={(loggerId) => {
          const serial = kit.find(({ id }) => id === loggerId)?.serial;
          const first = values.clocks.length === 0 && serial !== undefined;
          onChange({
            loggerId,
            ...(first ? { clocks: [{ serial, startS: null, endS: null }] } : {}),
          });
        }}
        error={error("loggerId")}
      />
      <ClockFields {...props} />
      <Caution>{t("caution.panel")}</Caution>
    </Section>
  );
}

export function NoiseSection(props: SectionProps) {
  const t = useWords("installation");
  const { format } = props;
  return (
    <Section title={t("noise.title")} section={props}>
      <Text tone="ink2">{t("noise.lead")}</Text>
      <FieldRow>
        <NumberField
          label={t("noise.flow")}
          unit="%"
          min={0}
          max={50}
          {...numberOf(props, "flowNoisePercent", "noise/flowPercent")}
        />
        <MeasureField
          format={format}
          quantity="temperatureDifference"
          label={t("noise.deltaT")}
          min={0}
          max={5}
          {...numberOf(props, "deltaTNoiseK", "noise/deltaTK")}
        />
        <NumberField
          label={t("noise.alike")}
          hint={t("noise.alikeHint")}
          min={-0.999}
          max={0.999}
          {...numberOf(props, "autocorrelation", "noise/autocorrelation")}
        />
      </FieldRow>
    </Section>
  );
}

export function FluidSection(props: SectionProps) {
  const t = useWords("installation");
  const { values, onChange, error } = props;
  return (
    <Section title={t("fluid.title")} section={props} checks={["fluid"]}>
      <DateField
        label={t("fluid.testedOn")}
        hint={t("fluid.hint")}
        value={values.fluidTestedOn}
        onChange={(fluidTestedOn) => onChange({ fluidTestedOn })}
        error={error("fluidTestedOn")}
      />
      <Caution>{t("caution.fluid")}</Caution>
    </Section>
  );
}

export function EditsSection(props: SectionProps) {
  const t = useWords("installation");
  return (
    <Section title={t("edits.title")} section={props}>
      <Text tone="ink2">{t("edits.lead")}</Text>
      <EditFields {...props} />
    </Section>
  );
}
