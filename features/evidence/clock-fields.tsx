import { View } from "react-native";
import { useWords } from "@features/i18n";
import { Button, FieldRow, NumberField, TextField } from "@features/ui";
import type { SectionProps } from "./section";
import type { ClockValues } from "./installation-values";

/** Each logger's clock against one reference, at start and end. */
export function ClockFields({ values, onChange, onReadable, error }: SectionProps) {
  const t = useWords("installation");
  const { clocks } = values;
  const set = (at: number, changes: Partial<ClockValues>) =>
    onChange({
      clocks: clocks.map((clock, index) => (index === at ? { ...clock, ...changes } : clock)),
    });
  const seconds = { unit: "s", min: -86400, max: 86400 } as const;
  return (
    <View style={{ gap: 12 }}>
      {clocks.map((clock, at) => (
        <View
          key={at}
          role="group"
          aria-label={t("clock.of", { number: at + 1 })}
          style={{ gap: 8 }}
        >
          <FieldRow>
            <TextField
              label={t("clock.serial")}
              value={clock.serial}
              onChange={(serial) => set(at, { serial })}
              error={error(`clocks/${at}/loggerSerial`)}
              asRead
              autoComplete="off"
            />
            <NumberField
              {...seconds}
              label={t("clock.start")}
              hint={t("clock.hint")}
              value={clock.startS}
              onChange={(startS, readable) => {
                set(at, { startS });
                onReadable(`clock${at}Start`, readable);
              }}
            />
            <NumberField
              {...seconds}
              label={t("clock.end")}
              value={clock.endS}
              onChange={(endS, readable) => {
                set(at, { endS });
                onReadable(`clock${at}End`, readable);
              }}
            />
          </FieldRow>
          <View style={{ alignSelf: "flex-start" }}>
            <Button
              kind="quiet"
              size="dense"
              label={t("clock.remove")}
              said={t("clock.removeSaid", { number: at + 1 })}
              onPress={() => onChange({ clocks: clocks.filter((_, index) => index !== at) })}
            />
          </View>
        </View>
      ))}
      {clocks.length < 6 ? (
        <View style={{ alignSelf: "flex-start" }}>
          <Button
            kind="second"
            size="dense"
            icon="plus"
            label={t("clock.add")}
            onPress={() =>
              onChange({ clocks: [...clocks, { serial: "", startS: null, endS: null }] })
            }
          />
        </View>
      ) : null}
    </View>
  );
}
