import { View } from "react-native";
import { kitPaths } from "@features/kit/kit-paths";
import { useWords } from "@features/i18n";
import { CheckField, FieldRow, SelectField, TextLink } from "@features/ui";
import { Caution } from "./caution";
import { NEWEST, NONE, type ProbeValues } from "./installation-values";
import { MeasureField } from "./measure-field";
import { Section, type SectionProps, numberOf, choices } from "./section";

export function ProbesSection(props: SectionProps) {
  const t = useWords("installation");
  const { values, onChange, error, checks, format, loop } = props;
  const kelvin = { format, quantity: "temperatureDifference" } as const;
  const ofPair = checks.filter(
    ({ firstProbeId, secondProbeId }) =>
      [firstProbeId, secondProbeId].includes(values.supply.probeId) &&
      [firstProbeId, secondProbeId].includes(values.return.probeId),
  );
  const paired = values.supply.probeId !== NONE && values.return.probeId !== NONE;
  return (
    <Section title={t("probes.title")} section={props} checks={["bathCheck", "deltaT", "mounting"]}>
      {loop.service === "chilled" ? null : <Caution>{t("caution.hot")}</Caution>}
      <Caution>{t("caution.pocket")}</Caution>
      <ProbeFields {...props} side="supply" />
      <ProbeFields {...props} side="return" />
      {paired ? (
        <SelectField
          label={t("probes.check")}
          hint={t("probes.checkHint")}
          value={values.bathCheckId}
          options={[
            { value: NEWEST, label: t("probes.newest") },
            ...ofPair.map(({ id, checkedOn, meanDifferenceK }) => ({
              value: id,
              label: t("probes.checkOf", {
                day: format.day(checkedOn, "dayMonthYear"),
                mean: format.withUnit(meanDifferenceK, "temperatureDifference", 3),
              }),
            })),
          ]}
          onChange={(bathCheckId) => onChange({ bathCheckId })}
          error={error("bathCheckId")}
        />
      ) : null}
      {paired ? (
        <TextLink
          variant="small"
          label={t("probes.addCheck")}
          href={kitPaths.newBathCheck({
            first: values.supply.probeId,
            second: values.return.probeId,
          })}
        />
      ) : null}
      <FieldRow>
        <MeasureField
          {...kelvin}
          label={t("probes.mountingK")}
          hint={t("probes.mountingHint")}
          min={0}
          max={10}
          {...numberOf(props, "mountingK", "mountingK")}
        />
        <MeasureField
          {...kelvin}
          label={t("probes.step")}
          min={0}
          max={5}
          {...numberOf(props, "temperatureStepK", "temperatureStepK")}
        />
      </FieldRow>
    </Section>
  );
}

function ProbeFields(props: SectionProps & { side: "supply" | "return" }) {
  const t = useWords("installation");
  const { values, onChange, onReadable, error, kit, format, side } = props;
  const probe = values[side];
  const set = (changes: Partial<ProbeValues>) => onChange({ [side]: { ...probe, ...changes } });
  return (
    <View role="group" aria-label={t(`probes.${side}`)} style={{ gap: 10 }}>
      <FieldRow>
        <SelectField
          label={t(`probes.${side}`)}
          value={probe.probeId}
          options={[
            { value: NONE, label: t("notSaid") },
            ...choices(kit, ["probe"], probe.probeId),
          ]}
          onChange={(probeId) => set({ probeId })}
          error={error(`probes/${side}/probeId`)}
        />
        <SelectField
          label={t("probes.mounting")}
          value={probe.mounting}
          options={(["pocket", "surface"] as const).map((value) => ({
            value,
            label: t(`probes.mountings.${value}`),
          }))}
          onChange={(mounting) => set({ mounting })}
        />
        {probe.mounting === "pocket" ? (
          <MeasureField
            format={format}
            quantity="pipeSize"
            label={t("probes.depth")}
            min={20}
            max={300}
            value={probe.depthMm}
            error={error(`probes/${side}/depthMm`)}
            onChange={(depthMm, readable) => {
              set({ depthMm });
              onReadable(`${side}Depth`, readable);
            }}
          />
        ) : null}
      </FieldRow>
      <CheckField
        label={t("probes.insulated")}
        hint={probe.mounting === "surface" ? t("probes.insulatedHint") : undefined}
        checked={probe.insulated}
        onChange={(insulated) => set({ insulated })}
      />
    </View>
  );
}
