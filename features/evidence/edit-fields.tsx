import { View } from "react-native";
import { BUDGET_TERM_KINDS, type BudgetTermKind } from "@shared/domain/uncertainty/point-evidence";
import { useWords } from "@features/i18n";
import { Button, FieldRow, NumberField, SelectField, TextField } from "@features/ui";
import type { SectionProps } from "./section";
import type { EditValues } from "./installation-values";

/** Put on with the time asked about, not with the installation. */
const notHere: readonly BudgetTermKind[] = ["filled", "meterLimits"];

/** Terms of the budget set by hand, each with why. */
export function EditFields({ values, onChange, onReadable, error, found }: SectionProps) {
  const t = useWords("installation");
  const terms = useWords("workings");
  const { edits } = values;
  const free = BUDGET_TERM_KINDS.filter(
    (kind) => !notHere.includes(kind) && !edits.some((edit) => edit.kind === kind),
  );
  const set = (at: number, changes: Partial<EditValues>) =>
    onChange({
      edits: edits.map((edit, index) => (index === at ? { ...edit, ...changes } : edit)),
    });
  const name = (kind: BudgetTermKind) => terms(`budget.term.${kind}`);
  const [next] = free;
  return (
    <View style={{ gap: 12 }}>
      {edits.map((edit, at) => {
        const unit = found?.budget.terms.find(({ kind }) => kind === edit.kind)?.unit;
        return (
          <View key={edit.kind} role="group" aria-label={name(edit.kind)} style={{ gap: 8 }}>
            <FieldRow>
              <SelectField
                label={t("edits.term")}
                value={edit.kind}
                options={[edit.kind, ...free].map((kind) => ({ value: kind, label: name(kind) }))}
                onChange={(kind) => set(at, { kind })}
                error={error(`edits/${at}/kind`)}
              />
              <NumberField
                label={t("edits.value")}
                hint={t("edits.valueHint")}
                unit={unit}
                min={0}
                max={1000}
                value={edit.value}
                onChange={(value, readable) => {
                  set(at, { value });
                  onReadable(`edit${at}`, readable);
                }}
                error={error(`edits/${at}/value`)}
              />
            </FieldRow>
            <TextField
              label={t("edits.reason")}
              value={edit.reason}
              onChange={(reason) => set(at, { reason })}
              error={error(`edits/${at}/reason`)}
              autoComplete="off"
            />
            <View style={{ alignSelf: "flex-start" }}>
              <Button
                kind="quiet"
                size="dense"
                label={t("edits.remove")}
                said={t("edits.removeSaid", { term: name(edit.kind) })}
                onPress={() => onChange({ edits: edits.filter((_, index) => index !== at) })}
              />
            </View>
          </View>
        );
      })}
      {next === undefined ? null : (
        <View style={{ alignSelf: "flex-start" }}>
          <Button
            kind="second"
            size="dense"
            icon="plus"
            label={t("edits.add")}
            onPress={() => onChange({ edits: [...edits, { kind: next, value: null, reason: "" }] })}
          />
        </View>
      )}
    </View>
  );
}
