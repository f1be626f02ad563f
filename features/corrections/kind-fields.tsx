import { useQuery } from "@tanstack/react-query";
import { METER_POWER_UNITS } from "@shared/domain/log-files/column-units";
import type { Quantity } from "@shared/domain/units/display-units";
import { useWords } from "@features/i18n";
import {
  Banner,
  ChoiceTiles,
  FieldRow,
  NumberField,
  SelectField,
  SwitchField,
  Text,
} from "@features/ui";
import type { Format } from "@shared/formats/format";
import { quantityOf, ruleChannels, type UnitChannel } from "./change-draft";
import { correctionsQueries } from "./corrections-queries";
import { SpanFields, WallTimeFields, type DraftProps } from "./span-fields";

export interface KindProps extends DraftProps {
  readonly pointId: string;
  readonly format: Format;
}

/** The fields a kind of correction needs. */
export function KindFields(props: KindProps) {
  switch (props.draft.kind) {
    case "exclude":
      return <ExcludeFields {...props} />;
    case "swapSides":
      return <SwapFields {...props} />;
    case "flipFlow":
      return <SpanFields {...props} />;
    case "scaleByBore":
      return <BoreFields {...props} />;
    case "probeOffset":
      return <ProbeFields {...props} />;
    case "clock":
      return <ClockFields {...props} />;
    case "unit":
      return <UnitFields {...props} />;
    case "fluid":
      return <FluidFields {...props} />;
    case "split":
      return <SplitFields {...props} />;
    case null:
      return null;
  }
}

function ExcludeFields(props: KindProps) {
  const { draft, onChange, errorOf, format } = props;
  const t = useWords("corrections");
  const quantity = quantityOf[draft.channel];
  return (
    <>
      <SpanFields {...props} />
      <SwitchField
        label={t("field.byRule")}
        detail={t("field.byRuleDetail")}
        on={draft.byRule}
        onChange={(byRule) => onChange({ byRule })}
      />
      {draft.byRule ? (
        <>
          <FieldRow>
            <SelectField
              label={t("field.channel")}
              value={draft.channel}
              options={ruleChannels.map((value) => ({ value, label: t(`channel.${value}`) }))}
              onChange={(channel) => onChange({ channel })}
            />
            <SelectField
              label={t("field.is")}
              value={draft.is}
              options={(["below", "above"] as const).map((value) => ({
                value,
                label: t(`is.${value}`),
              }))}
              onChange={(is) => onChange({ is })}
            />
          </FieldRow>
          <NumberField
            key={draft.channel}
            label={t("field.bound")}
            unit={quantity === null ? "%" : format.unit(quantity).unit}
            value={draft.bound}
            onChange={(bound, readable) => onChange({ bound: readable ? bound : null })}
            error={errorOf("bound")}
            required
          />
        </>
      ) : null}
    </>
  );
}

function SwapFields(props: KindProps) {
  const { draft, onChange, errorOf } = props;
  const t = useWords("corrections");
  return (
    <>
      <ChoiceTiles
        label={t("field.swapped")}
        value={draft.swapped}
        choices={(["probes", "channels"] as const).map((value) => ({
          value,
          label: t(`swapped.${value}.label`),
          detail: t(`swapped.${value}.detail`),
        }))}
        onChange={(swapped) => onChange({ swapped })}
        error={errorOf("swapped")}
        required
      />
      <SpanFields {...props} />
    </>
  );
}

function useDisplayed({ draft, onChange, errorOf, format }: KindProps) {
  return (field: "enteredBore" | "trueBore" | "addK", quantity: Quantity) => ({
    unit: format.unit(quantity).unit,
    value: draft[field],
    onChange: (value: number | null, readable: boolean) =>
      onChange({ [field]: readable ? value : null }),
    error: errorOf(field),
    required: true,
  });
}

function BoreFields(props: KindProps) {
  const { draft, format } = props;
  const t = useWords("corrections");
  const displayed = useDisplayed(props);
  const { enteredBore, trueBore } = draft;
  const factor = enteredBore && trueBore ? (trueBore / enteredBore) ** 2 : null;
  return (
    <>
      <FieldRow>
        <NumberField label={t("field.enteredBore")} {...displayed("enteredBore", "pipeSize")} />
        <NumberField label={t("field.trueBore")} {...displayed("trueBore", "pipeSize")} />
      </FieldRow>
      {factor !== null ? (
        <Text tone="ink2" role="status">
          {t("field.factor", { factor: format.number(factor, 4) })}
        </Text>
      ) : null}
      <SpanFields {...props} />
    </>
  );
}

function ProbeFields(props: KindProps) {
  const { draft, onChange, errorOf } = props;
  const t = useWords("corrections");
  const displayed = useDisplayed(props);
  const probes = useQuery(correctionsQueries.probes(props.pointId));
  if (probes.data?.length === 0) return <Banner kind="look">{t("field.noProbes")}</Banner>;
  return (
    <>
      <SelectField
        label={t("field.probe")}
        hint={t("field.probeHint")}
        value={draft.probeId}
        options={(probes.data ?? []).map(({ id, serial }) => ({ value: id, label: serial }))}
        onChange={(probeId) => onChange({ probeId })}
        error={errorOf("probeId")}
        required
      />
      <NumberField
        label={t("field.addK")}
        hint={t("field.addKHint")}
        {...displayed("addK", "temperatureDifference")}
      />
      <SpanFields {...props} />
    </>
  );
}

function FileField({ draft, onChange, errorOf, pointId, format }: KindProps) {
  const t = useWords("corrections");
  const results = useQuery(correctionsQueries.results(pointId));
  const files = results.data?.items[0]?.files ?? [];
  return (
    <SelectField
      label={t("field.file")}
      value={draft.logFileId}
      options={files.map(({ id, name, rows }) => ({
        value: id,
        label: t("field.fileRows", { name, count: rows, rows: format.number(rows, 0) }),
      }))}
      onChange={(logFileId) => onChange({ logFileId })}
      error={errorOf("logFileId")}
      required
    />
  );
}

function ClockFields(props: KindProps) {
  const { draft, onChange, errorOf } = props;
  const t = useWords("corrections");
  return (
    <>
      <FileField {...props} />
      <FieldRow>
        <NumberField
          label={t("field.offset")}
          hint={t("field.offsetHint")}
          unit="s"
          value={draft.offsetS}
          onChange={(offsetS, readable) => onChange({ offsetS: readable ? offsetS : null })}
          error={errorOf("offsetS")}
          required
        />
        <NumberField
          label={t("field.drift")}
          hint={t("field.driftHint")}
          unit={t("field.driftUnit")}
          min={-3600}
          max={3600}
          value={draft.driftSPerDay}
          onChange={(driftSPerDay, readable) =>
            onChange({ driftSPerDay: readable ? driftSPerDay : null })
          }
        />
      </FieldRow>
      <WallTimeFields
        day={t("field.referenceDay")}
        time={t("field.referenceTime")}
        value={draft.from}
        error={errorOf("from")}
        onChange={(from) => onChange({ from })}
      />
    </>
  );
}

function SplitFields({ draft, onChange, errorOf }: KindProps) {
  const t = useWords("corrections");
  return (
    <WallTimeFields
      day={t("field.splitDay")}
      time={t("field.splitTime")}
      value={draft.from}
      error={errorOf("from")}
      onChange={(from) => onChange({ from })}
    />
  );
}

/** Units as the API names them, and as people write them. */
const flowUnits = { "m3/h": "m³/h", "L/s": "L/s", "L/min": "L/min", "US gpm": "US gpm" };
const temperatureUnits = { degC: "°C", degF: "°F", K: "K" };
const powerUnits = Object.fromEntries(METER_POWER_UNITS.map((unit) => [unit, unit]));
const unitsOf = (channel: UnitChannel): Readonly<Record<string, string>> =>
  channel === "flow" ? flowUnits : channel === "power" ? powerUnits : temperatureUnits;

function UnitFields(props: KindProps) {
  const { draft, onChange, errorOf } = props;
  const t = useWords("corrections");
  const units = draft.unitChannel === null ? {} : unitsOf(draft.unitChannel);
  return (
    <>
      <FileField {...props} />
      <FieldRow>
        <SelectField
          label={t("field.unitChannel")}
          value={draft.unitChannel}
          options={(["flow", "supply", "return", "power"] as const).map((value) => ({
            value,
            label: t(`channel.${value}`),
          }))}
          onChange={(unitChannel) => onChange({ unitChannel, unit: null })}
          error={errorOf("unitChannel")}
          required
        />
        <SelectField
          label={t("field.unit")}
          value={draft.unit}
          options={Object.entries(units).map(([value, label]) => ({ value, label }))}
          onChange={(unit) => onChange({ unit })}
          error={errorOf("unit")}
          required
        />
      </FieldRow>
    </>
  );
}

function FluidFields(props: KindProps) {
  const { draft, onChange, errorOf } = props;
  const t = useWords("corrections");
  return (
    <>
      <SelectField
        label={t("field.fluid")}
        value={draft.fluidKind}
        options={(["water", "ethyleneGlycol", "propyleneGlycol"] as const).map((value) => ({
          value,
          label: t(`fluid.${value}`),
        }))}
        onChange={(fluidKind) => onChange({ fluidKind })}
        error={errorOf("fluidKind")}
        required
      />
      {draft.fluidKind === null || draft.fluidKind === "water" ? null : (
        <FieldRow>
          <NumberField
            label={t("field.percent")}
            unit="%"
            min={0}
            max={60}
            value={draft.percent}
            onChange={(percent, readable) => onChange({ percent: readable ? percent : null })}
            error={errorOf("percent")}
            required
          />
          <SelectField
            label={t("field.basis")}
            value={draft.basis}
            options={(["mass", "volume"] as const).map((value) => ({
              value,
              label: t(`basis.${value}`),
            }))}
            onChange={(basis) => onChange({ basis })}
          />
        </FieldRow>
      )}
      <SpanFields {...props} />
    </>
  );
}
