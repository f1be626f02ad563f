import type { Loop, Point } from "@shared/contracts/places";
import { useWords, type Format } from "@features/i18n";
import { ChoiceTiles, FieldRow, Form, SelectField, TextField } from "@features/ui";
import { Section, SoftWarning } from "./loop-form";
import { NONE } from "./loop-values";
import { PipeFields } from "./pipe-fields";
import {
  possibleFeeders,
  type GapRule,
  type MeterSide,
  type PointRole,
  type PointValues,
} from "./point-values";
import type { SaveErrors } from "./use-save";

export type PointField = keyof PointValues;
export type PointProblems = Partial<Record<PointField, string>>;

export interface PointFormProps {
  readonly label: string;
  readonly values: PointValues;
  readonly onChange: (changes: Partial<PointValues>) => void;
  readonly onReadable: (field: PointField, readable: boolean) => void;
  readonly onSubmit: () => void;
  readonly problems: PointProblems;
  readonly errors: SaveErrors;
  readonly format: Format;
  readonly loop: Loop;
  readonly point: Point | null;
  readonly points: readonly Point[];
}

const serverNames: Partial<Record<PointField, string>> = {
  tableId: "pipe/tableId",
  dn: "pipe/dn",
  outsideDiameter: "pipe/outsideDiameterMm",
  wall: "pipe/wallMm",
  lining: "pipe/liningMm",
  material: "pipe/material",
};

export const pointServerFields = [
  "code",
  "name",
  "role",
  "parentPointId",
  "meterSide",
  "gapRule",
  "notes",
  ...Object.values(serverNames),
];

export function pointErrorOf(
  { problems, errors }: PointFormProps,
  field: PointField,
): string | null {
  return errors.field(serverNames[field] ?? field) ?? problems[field] ?? null;
}

const roles: readonly PointRole[] = ["main", "riser", "branch", "coil", "zone"];

export function PointForm(props: PointFormProps) {
  const t = useWords("places");
  const { values, onChange, point } = props;
  const feeders = possibleFeeders(props.points, point?.id ?? null);
  const mains = props.points.filter(
    ({ id, role, archivedAt }) => role === "main" && archivedAt === null && id !== point?.id,
  );
  return (
    <Form label={props.label} onSubmit={props.onSubmit} errors={props.errors.form}>
      <FieldRow>
        <TextField
          label={t("point.code")}
          hint={t("point.codeHint")}
          value={values.code}
          onChange={(code) => onChange({ code })}
          error={pointErrorOf(props, "code")}
          required
          asRead
          autoComplete="off"
        />
        <TextField
          label={t("point.name")}
          value={values.name}
          onChange={(name) => onChange({ name })}
          error={pointErrorOf(props, "name")}
          required
          autoComplete="off"
        />
      </FieldRow>
      <ChoiceTiles<MeterSide>
        label={t("point.meterSide")}
        hint={t("point.meterSideHint")}
        value={values.meterSide}
        columns={2}
        choices={[
          { value: "supply", label: t("side.supply"), detail: t("side.supplyDetail") },
          { value: "return", label: t("side.return"), detail: t("side.returnDetail") },
        ]}
        onChange={(meterSide) => onChange({ meterSide })}
        error={pointErrorOf(props, "meterSide")}
        required
      />
      <FieldRow>
        <SelectField
          label={t("point.role")}
          hint={values.role ? t(`role.${values.role}Detail`) : t("point.roleHint")}
          value={values.role}
          options={roles.map((role) => ({ value: role, label: t(`role.${role}`) }))}
          onChange={(role) => onChange({ role })}
          error={pointErrorOf(props, "role")}
          required
        />
        <SelectField
          label={t("point.parent")}
          hint={t("point.parentHint")}
          value={values.parentPointId}
          options={[
            { value: NONE, label: t("point.noParent") },
            ...feeders.map(({ id, code, name }) => ({ value: id, label: `${code}, ${name}` })),
          ]}
          onChange={(parentPointId) => onChange({ parentPointId })}
          error={pointErrorOf(props, "parentPointId")}
        />
      </FieldRow>
      {values.role === "main" && mains.length > 0 ? (
        <SoftWarning>{t("point.secondMain", { code: mains[0]?.code ?? "" })}</SoftWarning>
      ) : null}
      <Section title={t("pipe.title")}>
        <PipeFields {...props} />
      </Section>
      <ChoiceTiles<GapRule>
        label={t("point.gapRule")}
        hint={t("point.gapRuleHint")}
        value={values.gapRule}
        columns={2}
        choices={[
          { value: "survey", label: t("gapRule.survey"), detail: t("gapRule.surveyDetail") },
          { value: "billing", label: t("gapRule.billing"), detail: t("gapRule.billingDetail") },
        ]}
        onChange={(gapRule) => onChange({ gapRule })}
        error={pointErrorOf(props, "gapRule")}
      />
      <TextField
        label={t("loop.notes")}
        hint={t("point.notesHint")}
        value={values.notes}
        onChange={(notes) => onChange({ notes })}
        error={pointErrorOf(props, "notes")}
        lines={3}
      />
    </Form>
  );
}
