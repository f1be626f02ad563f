import { View } from "react-native";
import { energyRegister, volumeRegister } from "@shared/contracts/meter-comparisons";
import { useWords } from "@features/i18n";
import {
  CheckField,
  ChoiceTiles,
  FieldGroup,
  FieldRow,
  NumberField,
  SelectField,
  Text,
  TextField,
} from "@features/ui";
import { ClaimFields } from "./claim-fields";
import type { PointChoice } from "./compare-queries";
import type { EnergyUnitName, SideValues, VolumeUnitName } from "./comparison-values";
import { RegisterFields } from "./register-fields";

export interface SideFieldsProps {
  readonly title: string;
  readonly hint: string;
  readonly value: SideValues;
  /** Undefined while they load. */
  readonly points: readonly PointChoice[] | undefined;
  readonly onChange: (value: SideValues) => void;
  /** What the server refused, by the path below this side. */
  readonly errorOf: (field: string) => string | null;
}

type KindProps = SideFieldsProps & { readonly set: (changed: Partial<SideValues>) => void };

const kinds = ["point", "register", "typed"] as const;

/** One meter of a comparison: a point of ours, a register read by eye, or an energy from elsewhere. */
export function SideFields(props: SideFieldsProps) {
  const t = useWords("compare");
  const { value, onChange } = props;
  const set = (changed: Partial<SideValues>) => onChange({ ...value, ...changed });
  const choose = (kind: SideValues["kind"]) =>
    set({ kind, claim: kind === "point" ? "evidence" : kind === "register" ? "class" : "stated" });
  return (
    <FieldGroup title={props.title}>
      <View>
        <Text variant="heading">{props.title}</Text>
        <Text variant="small" tone="ink3">
          {props.hint}
        </Text>
      </View>
      <ChoiceTiles
        label={t("form.kind")}
        value={value.kind}
        choices={kinds.map((kind) => ({
          value: kind,
          label: t(`form.kinds.${kind}`),
          detail: t(`form.kindsDetail.${kind}`),
        }))}
        onChange={choose}
      />
      {value.kind === "point" ? <PointFields {...props} set={set} /> : null}
      {value.kind === "register" ? <MeterFields {...props} set={set} /> : null}
      {value.kind === "typed" ? <TypedFields {...props} set={set} /> : null}
    </FieldGroup>
  );
}

function PointFields({ value, points, errorOf, set }: KindProps) {
  const t = useWords("compare");
  const chosen = points?.find(({ id }) => id === value.pointId);
  const choose = (pointId: string) => {
    const service = points?.find(({ id }) => id === pointId)?.service;
    const register =
      service === "hot" ? "heating" : service === "chilled" ? "cooling" : value.register;
    set({ pointId, register });
  };
  if (points?.length === 0) return <Text tone="ink2">{t("point.none")}</Text>;
  return (
    <>
      <SelectField
        label={t("point.label")}
        value={value.pointId}
        options={(points ?? []).map(({ id, code, name, loopTag }) => ({
          value: id,
          label: t("point.option", { loop: loopTag, code, name }),
        }))}
        onChange={choose}
        error={errorOf("pointId")}
        disabled={points === undefined}
        required
      />
      {chosen?.service === "changeover" ? (
        <SelectField
          label={t("point.register")}
          value={value.register}
          options={(["heating", "cooling"] as const).map((register) => ({
            value: register,
            label: t(`point.registers.${register}`),
          }))}
          onChange={(register) => set({ register })}
          error={errorOf("register")}
          required
        />
      ) : null}
      <ClaimFields
        value={value}
        claims={["evidence", "class", "stated"]}
        onChange={set}
        errorOf={errorOf}
      />
    </>
  );
}

function MeterFields({ value, errorOf, set }: KindProps) {
  const t = useWords("compare");
  const below = (part: string) => (field: string) => errorOf(`${part}/${field}`);
  return (
    <>
      <TextField
        label={t("register.serial")}
        hint={t("register.serialHint")}
        value={value.name}
        onChange={(name) => set({ name })}
        error={errorOf("serial")}
        autoComplete="off"
        asRead
        required
      />
      <RegisterFields
        label={t("register.energy")}
        value={value.energy}
        unit={value.energyUnit}
        units={energyUnits}
        onChange={(energy) => set({ energy })}
        onUnit={(energyUnit) => set({ energyUnit })}
        errorOf={below("energy")}
      />
      <CheckField
        label={t("register.hasVolume")}
        checked={value.hasVolume}
        onChange={(hasVolume) => set({ hasVolume })}
      />
      {value.hasVolume ? (
        <RegisterFields
          label={t("register.volume")}
          value={value.volume}
          unit={value.volumeUnit}
          units={volumeUnits.map((unit) => ({ value: unit, label: t(`unit.${unit}`) }))}
          onChange={(volume) => set({ volume })}
          onUnit={(volumeUnit) => set({ volumeUnit })}
          errorOf={below("volume")}
        />
      ) : null}
      <NumberField
        label={t("register.deltaT")}
        hint={t("register.deltaTHint")}
        unit="K"
        value={value.deltaTK}
        onChange={(deltaTK) => set({ deltaTK })}
        min={0}
        max={150}
        error={errorOf("deltaTK")}
      />
      <ClaimFields value={value} claims={["class", "stated"]} onChange={set} errorOf={errorOf} />
    </>
  );
}

const energyUnits = energyRegister.shape.unit
  .unwrap()
  .options.map((unit: EnergyUnitName) => ({ value: unit, label: unit }));
const volumeUnits: readonly VolumeUnitName[] = volumeRegister.shape.unit.unwrap().options;

function TypedFields({ value, errorOf, set }: KindProps) {
  const t = useWords("compare");
  return (
    <>
      <TextField
        label={t("typed.name")}
        value={value.name}
        onChange={(name) => set({ name })}
        error={errorOf("name")}
        autoComplete="off"
        required
      />
      <FieldRow>
        <NumberField
          label={t("typed.energy")}
          unit="kWh"
          value={value.energyKwh}
          onChange={(energyKwh) => set({ energyKwh })}
          min={0}
          error={errorOf("energyKwh")}
          required
        />
        <NumberField
          label={t("typed.expanded")}
          hint={t("typed.blank")}
          unit="%"
          value={value.expandedPercent}
          onChange={(expandedPercent) => set({ expandedPercent })}
          min={0}
          max={100}
          error={errorOf("expandedPercent")}
        />
      </FieldRow>
      <FieldRow>
        <NumberField
          label={t("typed.volume")}
          unit="m³"
          value={value.volumeM3}
          onChange={(volumeM3) => set({ volumeM3 })}
          min={0}
          error={errorOf("volumeM3")}
        />
        <NumberField
          label={t("typed.volumePercent")}
          unit="%"
          value={value.volumePercent}
          onChange={(volumePercent) => set({ volumePercent })}
          min={0}
          max={100}
          error={errorOf("volumePercent")}
        />
      </FieldRow>
      <FieldRow>
        <NumberField
          label={t("typed.deltaT")}
          unit="K"
          value={value.deltaTK}
          onChange={(deltaTK) => set({ deltaTK })}
          min={0}
          max={150}
          error={errorOf("deltaTK")}
        />
        <NumberField
          label={t("typed.deltaTPercent")}
          unit="%"
          value={value.deltaTPercent}
          onChange={(deltaTPercent) => set({ deltaTPercent })}
          min={0}
          max={100}
          error={errorOf("deltaTPercent")}
        />
      </FieldRow>
    </>
  );
}
