import { View } from "react-native";
import type {
  BathCheck,
  Instrument,
  InstrumentKind,
  Verdict,
  WorkedOutInstallation,
} from "@shared/contracts/evidence";
import type { Loop } from "@shared/contracts/places";
import type { Format } from "@features/i18n";
import { Card, Text } from "@features/ui";
import type { InstallationValues } from "./installation-values";
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

/** One card of the form: its fields, then what the server says of them. */
export function Section(props: {
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
export function numberOf(
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

/** Instruments of some kinds that are in use, and the one chosen even where it is archived. */
export function choices(
  kit: readonly Instrument[],
  kinds: readonly InstrumentKind[],
  chosen: string,
) {
  return kit
    .filter(
      ({ id, kind, archivedAt }) => kinds.includes(kind) && (archivedAt === null || id === chosen),
    )
    .map(({ id, serial, label }) => ({
      value: id,
      label: label === null ? serial : `${serial}, ${label}`,
    }));
}
