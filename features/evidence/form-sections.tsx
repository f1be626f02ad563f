import { View } from "react-native";
import type {
  BathCheck,
  Instrument,
  InstrumentKind,
  Verdict,
  WorkedOutInstallation,
} from "@shared/contracts/evidence";
import type { Loop } from "@shared/contracts/places";
import { kitPaths } from "@features/kit/kit-paths";
import { useWords, type Format } from "@features/i18n";
import {
  Card,
  CheckField,
  ChoiceTiles,
  DateField,
  FieldRow,
  NumberField,
  SelectField,
  Text,
  TextField,
  TextLink,
  WorkedOutField,
} from "@features/ui";
import { Caution } from "./caution";
import { ClockFields } from "./clock-fields";
import { EditFields } from "./edit-fields";
import { fittings } from "./fittings";
import {
  NEWEST,
  NONE,
  readWalls,
  type InstallationValues,
  type ProbeValues,
} from "./installation-values";
import { MeasureField } from "./measure-field";
import { VerdictList } from "./verdict-list";

export interface SectionProps {
  readonly values: InstallationValues;
  readonly onChange: (changes: Partial<InstallationValues>) => void;
  readonly onReadable: (field: string, readable: boolean) => void;
  /** The server's word on a field of the body, or our own. */
  readonly error: (field: string) => string | null;
  readonly format: Format;
  readonly loop: Loop;
  readonly kit: readonly Instrument[];
  readonly checks: readonly BathCheck[];
  /** What follows from what is typed; undefined until a start is given. */
  readonly found: WorkedOutInstallation | undefined;
}

function Section(props: {
  title: string;
  checks?: readonly Verdict["check"][];
  section: SectionProps;
  children: React.ReactNode;
}) {
  const { title, checks, section } = props;
  return (
    <Card label={title}>
      <View style={{ gap: 14 }}>
        <Text variant="heading">{title}</Text>
        {props.children}
        {checks && section.found ? (
          <VerdictList verdicts={section.found.verdicts} format={section.format} of={checks} live />
        ) : null}
      </View>
    </Card>
  );
}

type NumberKey = {
  [Key in keyof InstallationValues]: InstallationValues[Key] extends number | null ? Key : never;
}[keyof InstallationValues];

/** Wiring of one number of the form. */
function numberOf(
  { values, onChange, onReadable, error }: SectionProps,
  key: NumberKey,
  path: string,
) {
  return {
    value: values[key],
    error: error(path),
    onChange: (value: number | null, readable: boolean) => {
      onChange({ [key]: value });
      onReadable(key, readable);
    },
  };
}

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

/** Instruments of some kinds that are in use, and the one chosen even where it is archived. */
function choices(kit: readonly Instrument[], kinds: readonly InstrumentKind[], chosen: string) {
  return kit
    .filter(
      ({ id, kind, archivedAt }) => kinds.includes(kind) && (archivedAt === null || id === chosen),
    )
    .map(({ id, serial, label }) => ({
      value: id,
      label: label === null ? serial : `${serial}, ${label}`,
    }));
}

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
