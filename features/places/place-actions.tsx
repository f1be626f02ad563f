import { useState } from "react";
import { View } from "react-native";
import { useWords } from "@features/i18n";
import { Banner, Button, Card, Dialog, Text, useToast } from "@features/ui";
import { useSave } from "./use-save";

export type PlaceKind = "site" | "building" | "loop" | "point";

/**
 * The ways out of use for a site, building, loop or point. What holds readings is archived and can
 * be restored; what holds none may also be removed, which a dialog asks first, naming it.
 */
export function PlaceActions(props: {
  kind: PlaceKind;
  /** As people call it: “CHW-1B”. */
  name: string;
  archived: boolean;
  can: { readonly archive: boolean; readonly remove: boolean };
  onArchive: (archived: boolean) => Promise<unknown>;
  onRemove: () => Promise<unknown>;
  /** Where to go once it has left. */
  onGone: () => void;
}) {
  const t = useWords("places");
  const toast = useToast();
  const [asking, setAsking] = useState(false);
  const archiving = useSave((archived: boolean) => props.onArchive(archived), []);
  const removing = useSave<void, unknown>(() => props.onRemove(), []);
  const { kind, name, archived, can } = props;
  if (!can.archive && !can.remove) return null;
  const values = { name };
  const archive = () =>
    archiving.save(!archived, () => {
      toast({ message: t(archived ? "archive.restored" : "archive.done", values) });
      if (!archived) props.onGone();
    });
  const problems = [...archiving.errors.form, ...removing.errors.form];
  return (
    <Card pad={4} label={t("archive.title")}>
      <View style={{ gap: 12 }}>
        <Text variant="heading" level={2}>
          {t("archive.title")}
        </Text>
        <Text tone="ink2">
          {archived
            ? t("archive.isArchived")
            : can.remove
              ? t(`archive.empty.${kind}`)
              : t(`archive.holds.${kind}`)}
        </Text>
        {problems.length > 0 ? (
          <Banner kind="wrong" live>
            {problems.join(" ")}
          </Banner>
        ) : null}
        <View style={{ flexDirection: "row", flexWrap: "wrap", gap: 12 }}>
          {can.archive ? (
            <Button
              kind="second"
              icon={archived ? "undo" : "archive"}
              label={archived ? t("archive.restore") : t("archive.archive")}
              said={t(archived ? "archive.restoreSaid" : "archive.archiveSaid", values)}
              busy={archiving.busy}
              onPress={archive}
            />
          ) : null}
          {can.remove ? (
            <Button
              kind="second"
              label={t("archive.remove")}
              said={t("archive.removeSaid", values)}
              onPress={() => setAsking(true)}
            />
          ) : null}
        </View>
      </View>
      <Dialog
        open={asking}
        stop
        title={t("archive.removeAsk", values)}
        confirmLabel={t("archive.removeSaid", values)}
        busy={removing.busy}
        onClose={() => setAsking(false)}
        onConfirm={() =>
          removing.save(undefined, () => {
            setAsking(false);
            toast({ message: t("archive.removed", values) });
            props.onGone();
          })
        }
      >
        <View style={{ gap: 10 }}>
          <Text tone="ink2">{t(`archive.removeDetail.${kind}`)}</Text>
          {removing.errors.form.length > 0 ? (
            <Banner kind="wrong" live>
              {removing.errors.form.join(" ")}
            </Banner>
          ) : null}
        </View>
      </Dialog>
    </Card>
  );
}
