import { useState, type ReactNode } from "react";
import { View } from "react-native";
import type { Building, Loop, LoopService } from "@shared/contracts/places";
import { useWords, type Format } from "@features/i18n";
import {
  ChoiceTiles,
  FieldGroup,
  FieldRow,
  Form,
  MarkedText,
  SelectField,
  Text,
  TextField,
} from "@features/ui";
import { FluidFields } from "./fluid-fields";
import { LoopNumberFields } from "./loop-number-fields";
import { NONE, possibleParents, type LoopValues } from "./loop-values";
import type { SaveErrors } from "./use-save";

export type LoopField = keyof LoopValues;
export type LoopProblems = Partial<Record<LoopField, string>>;

export interface LoopFormProps {
  readonly label: string;
  readonly values: LoopValues;
  readonly onChange: (changes: Partial<LoopValues>) => void;
  /** Tells whether what is typed in a number field can be used. */
  readonly onReadable: (field: LoopField, readable: boolean) => void;
  readonly onSubmit: () => void;
  readonly problems: LoopProblems;
  readonly errors: SaveErrors;
  readonly format: Format;
  readonly loop: Loop | null;
  readonly loops: readonly Loop[];
  readonly buildings: readonly Building[];
}

/** The server's name of each field, where it differs from the form's. */
export const serverNames: Partial<Record<LoopField, string>> = {
  fluidKind: "fluid/kind",
  glycolPercent: "fluid/percent",
  glycolBasis: "fluid/basis",
  glycolTestedOn: "fluid/testedOn",
  glycolTestMethod: "fluid/testMethod",
  gaugePressure: "gaugePressureMPa",
  designFlow: "designFlowM3PerHour",
  designDeltaT: "designDeltaTK",
  flowCutOff: "flowCutOffM3PerHour",
  deltaTCutOff: "deltaTCutOffK",
};

export const loopServerFields = [
  "tag",
  "name",
  "service",
  "buildingId",
  "parentLoopId",
  "notes",
  ...Object.values(serverNames),
];

/** What is wrong with a field: the server's word first, then ours. */
export function errorOf({ problems, errors }: LoopFormProps, field: LoopField): string | null {
  return errors.field(serverNames[field] ?? field) ?? problems[field] ?? null;
}

export function LoopForm(props: LoopFormProps) {
  const t = useWords("places");
  const { values, onChange } = props;
  return (
    <Form label={props.label} onSubmit={props.onSubmit} errors={props.errors.form}>
      <FieldRow>
        <TextField
          label={t("loop.tag")}
          hint={t("loop.tagHint")}
          value={values.tag}
          onChange={(tag) => onChange({ tag })}
          error={errorOf(props, "tag")}
          required
          asRead
          autoComplete="off"
        />
        <TextField
          label={t("loop.name")}
          value={values.name}
          onChange={(name) => onChange({ name })}
          error={errorOf(props, "name")}
          required
          autoComplete="off"
        />
      </FieldRow>
      <ChoiceTiles<LoopService>
        label={t("loop.service")}
        value={values.service}
        columns={3}
        choices={[
          { value: "chilled", label: t("service.chilled"), detail: t("service.chilledDetail") },
          { value: "hot", label: t("service.hot"), detail: t("service.hotDetail") },
          {
            value: "changeover",
            label: t("service.changeover"),
            detail: t("service.changeoverDetail"),
          },
        ]}
        onChange={(service) => onChange({ service })}
        error={errorOf(props, "service")}
        required
      />
      <PlaceFields {...props} />
      <Section title={t("loop.fluidTitle")}>
        <FluidFields {...props} />
      </Section>
      <LoopNumberFields {...props} />
      <TextField
        label={t("loop.notes")}
        hint={t("form.optional")}
        value={values.notes}
        onChange={(notes) => onChange({ notes })}
        error={errorOf(props, "notes")}
        lines={3}
      />
    </Form>
  );
}

function PlaceFields(props: LoopFormProps) {
  const t = useWords("places");
  const { values, onChange, loops, loop, buildings } = props;
  const parents = possibleParents(loops, loop?.id ?? null);
  const parent = loops.find(({ id }) => id === values.parentLoopId);
  const differs =
    parent !== undefined &&
    values.service !== null &&
    parent.service !== values.service &&
    parent.service !== "changeover" &&
    values.service !== "changeover";
  return (
    <>
      <FieldRow>
        <SelectField
          label={t("loop.building")}
          value={values.buildingId}
          options={[
            { value: NONE, label: t("loop.noBuilding") },
            ...buildings.map(({ id, name }) => ({ value: id, label: name })),
          ]}
          onChange={(buildingId) => onChange({ buildingId })}
          error={errorOf(props, "buildingId")}
        />
        <SelectField
          label={t("loop.parent")}
          hint={t("loop.parentHint")}
          value={values.parentLoopId}
          options={[
            { value: NONE, label: t("loop.noParent") },
            ...parents.map(({ id, tag, name }) => ({ value: id, label: `${tag}, ${name}` })),
          ]}
          onChange={(parentLoopId) => onChange({ parentLoopId })}
          error={errorOf(props, "parentLoopId")}
        />
      </FieldRow>
      {differs ? <SoftWarning>{t("loop.parentDiffers")}</SoftWarning> : null}
    </>
  );
}

/** A part of a form under a heading of its own. */
export function Section({ title, children }: { title: string; children: ReactNode }) {
  return (
    <View style={{ gap: 14, marginTop: 8 }}>
      <Text variant="subhead" level={2}>
        {title}
      </Text>
      <FieldGroup title={title}>{children}</FieldGroup>
    </View>
  );
}

/** Unusual but possible: said beside the field, and saving goes on. */
export function SoftWarning({ children }: { children: string }) {
  return (
    <View role="status">
      <MarkedText kind="look" variant="small">
        {children}
      </MarkedText>
    </View>
  );
}

/** Typing a number and telling the form whether it can be used. */
export function useNumberChange(props: LoopFormProps) {
  const [unreadable, setUnreadable] = useState<ReadonlySet<LoopField>>(new Set());
  return {
    unreadable,
    change: (field: LoopField) => (value: number | null, readable: boolean) => {
      props.onChange({ [field]: value });
      props.onReadable(field, readable);
      setUnreadable((before) => {
        const next = new Set(before);
        if (readable) next.delete(field);
        else next.add(field);
        return next;
      });
    },
  };
}
