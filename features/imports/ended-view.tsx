import { View } from "react-native";
import { useWords } from "@features/i18n";
import { Banner, Button, Row } from "@features/ui";
import type { ImportDetail } from "@shared/contracts/imports";
import { ImportHistory } from "./import-history";
import { importPaths } from "./import-paths";
import type { ImportActions } from "./imports-queries";

/** An import that stores nothing: undone, stopped or failed, with the way back into it. */
export function EndedView({ detail, actions }: { detail: ImportDetail; actions: ImportActions }) {
  const t = useWords("imports");
  const state = detail.state === "undone" || detail.state === "cancelled" ? detail.state : "failed";
  const why = detail.failure ? `${detail.failure.detail} ${detail.failure.remedy}` : "";
  return (
    <View style={{ gap: 20 }}>
      <Banner kind={state === "failed" ? "wrong" : "note"} lead={t(`ended.${state}.title`)} live>
        {`${t(`ended.${state}.text`)} ${why}`.trim()}
      </Banner>
      <Row gap={3} wrap>
        {detail.can.reopen ? (
          <Button
            label={t(`ended.${state}.action`)}
            busy={actions.reopen.isPending}
            onPress={() => actions.reopen.mutate()}
          />
        ) : null}
        <Button kind="second" href={importPaths.logs} label={t("ended.logs")} />
      </Row>
      <ImportHistory detail={detail} />
    </View>
  );
}
