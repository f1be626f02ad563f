import { View } from "react-native";

import { useWords, type Format } from "@features/i18n";
import { ChoiceTiles, FieldRow, Form, NumberField, Text } from "@features/ui";
import { Section } from "./loop-form";
import type { PumpValues } from "./pump-values";
import { shownRange } from "./shown-range";
import type { SaveErrors } from "./use-save";

export type PumpField = keyof PumpValues;
export type PumpProblems = Partial<Record<PumpField, string>>;

/** The server's name of each field. */
export const pumpServerNames: Readonly<Record<PumpField, string>> = {
  controlledHead: "controlledHead",
  staticHead: "staticHeadM",
  designHead: "designHeadM",
  designFlow: "designFlowM3PerHour",
  efficiencyPercent: "efficiency",
  minimumFlow: "minimumFlowM3PerHour",
  price: "pricePerKwh",
};

export interface PumpFormProps {
  readonly label: string;
  readonly values: PumpValues;
  readonly onChange: (changes: Partial<PumpValues>) => void;
  readonly onReadable: (field: PumpField, readable: boolean) => void;
  readonly onSubmit: () => void;
  readonly problems: PumpProblems;
  readonly errors: SaveErrors;
  readonly format: Format;
  readonly currency: string;
}

type NumberName = Exclude<PumpField, "controlledHead">;

/** What a loop's pump has to lift, at what efficiency and price. */
export function PumpForm(props: PumpFormProps) {
  const t = useWords("load");
  const { values, onChange, format } = props;
  const error = (field: PumpField) =>
    props.errors.field(pumpServerNames[field]) ?? props.problems[field] ?? null;
  const change = (field: NumberName) => (value: number | null, readable: boolean) => {
    onChange({ [field]: value });
    props.onReadable(field, readable);
  };
  const length = format.unit("distance").unit;
  const flow = format.unit("flow").unit;
  return (
    <Form label={props.label} onSubmit={props.onSubmit} errors={props.errors.form}>
      <Text tone="ink2">{t("pump.why")}</Text>
      <ChoiceTiles<"yes" | "no">
        label={t("pump.head")}
        value={values.controlledHead}
        columns={2}
        choices={[
          { value: "yes", label: t("pump.headYes"), detail: t("pump.headYesDetail") },
          { value: "no", label: t("pump.headNo"), detail: t("pump.headNoDetail") },
        ]}
        onChange={(controlledHead) => onChange({ controlledHead })}
        error={error("controlledHead")}
        required
      />
      <Section title={t("pump.curve")}>
        <Text variant="small" tone="ink2">
          {t("pump.curveHint")}
        </Text>
        {values.controlledHead === "yes" ? (
          <NumberField
            label={t("pump.static")}
            hint={t("pump.staticHint")}
            unit={length}
            value={values.staticHead}
            onChange={change("staticHead")}
            {...shownRange(format, "distance", 0, 500)}
            error={error("staticHead")}
          />
        ) : null}
        <FieldRow>
          <NumberField
            label={t("pump.design")}
            unit={length}
            value={values.designHead}
            onChange={change("designHead")}
            {...shownRange(format, "distance", 0.01, 500)}
            error={error("designHead")}
          />
          <NumberField
            label={t("pump.flow")}
            unit={flow}
            value={values.designFlow}
            onChange={change("designFlow")}
            {...shownRange(format, "flow", 0.001, 10_000)}
            error={error("designFlow")}
          />
        </FieldRow>
        <NumberField
          label={t("pump.efficiency")}
          hint={t("pump.efficiencyHint")}
          unit="%"
          value={values.efficiencyPercent}
          onChange={change("efficiencyPercent")}
          min={1}
          max={100}
          error={error("efficiencyPercent")}
        />
      </Section>
      <Section title={t("pump.other")}>
        <FieldRow>
          <NumberField
            label={t("pump.minimum")}
            hint={t("pump.minimumHint")}
            unit={flow}
            value={values.minimumFlow}
            onChange={change("minimumFlow")}
            {...shownRange(format, "flow", 0, 10_000)}
            error={error("minimumFlow")}
          />
          <View>
            <NumberField
              label={t("pump.price")}
              hint={t("pump.optional")}
              unit={t("pump.priceUnit", { currency: props.currency })}
              value={values.price}
              onChange={change("price")}
              min={0}
              max={99_999}
              error={error("price")}
            />
          </View>
        </FieldRow>
      </Section>
    </Form>
  );
}
