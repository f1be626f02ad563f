import { useQuery } from "@tanstack/react-query";
import { router } from "expo-router";
import { useState } from "react";
import { View } from "react-native";
import { ApiError } from "@features/api";
import { useWords } from "@features/i18n";
import { Banner, Button, Card, ErrorState, Row, SelectField, Text, TextLink } from "@features/ui";
import type { ImportDetail, ImportFile } from "@shared/contracts/imports";
import { useColumnName } from "./column-controls";
import { importPaths } from "./import-paths";
import { placesToImportQuery, useImportAlso } from "./imports-queries";

interface AlsoForPointProps {
  readonly file: ImportFile;
  readonly detail: ImportDetail;
}

/** A file of several points: which others read it, and how to use it for one more. */
export function AlsoForPoint({ file, detail }: AlsoForPointProps) {
  const t = useWords("imports");
  const holdsSeveral = (file.recognition?.pointSets ?? []).length > 1;
  const isAsked = file.questions.some(({ code }) => code === "whichSet");
  const offers = detail.can.edit && holdsSeveral && !isAsked;
  if (!offers && file.alsoFor.length === 0) return null;
  return (
    <Card pad={5} label={t("columns.also.title")}>
      <View style={{ gap: 12 }}>
        <Text variant="subhead" level={2}>
          {t("columns.also.title")}
        </Text>
        {file.alsoFor.map((other) => (
          <Other key={other.importId} file={file} other={other} />
        ))}
        {offers ? <OpenAnother file={file} detail={detail} /> : null}
      </View>
    </Card>
  );
}

function Other({ file, other }: { file: ImportFile; other: ImportFile["alsoFor"][number] }) {
  const t = useWords("imports");
  const name = useColumnName();
  const names = { point: other.point.name, loop: other.loopTag };
  const same = other.sameColumns.flatMap((index) => file.recipe?.columns[index] ?? []);
  return (
    <View style={{ gap: 4 }}>
      {same.length > 0 ? (
        <Banner kind="look">
          {t("columns.also.same", { ...names, columns: same.map(name).join(", ") })}
        </Banner>
      ) : (
        <Text tone="ink2">{t("columns.also.shared", names)}</Text>
      )}
      <TextLink href={importPaths.wizard(other.importId)} label={t("columns.also.openIt")} />
    </View>
  );
}

function OpenAnother({ file, detail }: AlsoForPointProps) {
  const t = useWords("imports");
  const [loopId, setLoopId] = useState<string | null>(null);
  const [pointId, setPointId] = useState<string | null>(null);
  const loops = useQuery(placesToImportQuery.loops(detail.site.id));
  const points = useQuery({
    ...placesToImportQuery.points(loopId ?? ""),
    enabled: loopId !== null,
  });
  const also = useImportAlso(detail.id, file.id);
  const others = (points.data?.items ?? []).filter(({ id }) => id !== detail.point.id);
  return (
    <>
      <Text tone="ink2">{t("columns.also.text", { site: detail.site.name })}</Text>
      <SelectField
        label={t("columns.also.loop")}
        value={loopId}
        emptyLabel={t("columns.also.choose")}
        options={(loops.data?.items ?? []).map(({ id, tag, name }) => ({
          value: id,
          label: `${tag} ${name}`,
        }))}
        onChange={(chosen) => {
          setLoopId(chosen);
          setPointId(null);
        }}
      />
      {loopId === null || !points.data ? null : (
        <SelectField
          label={t("columns.also.point")}
          value={pointId}
          emptyLabel={t("columns.also.choose")}
          options={others.map(({ id, code, name }) => ({ value: id, label: `${code} ${name}` }))}
          onChange={setPointId}
        />
      )}
      {also.error ? (
        <ErrorState problem={also.error instanceof ApiError ? also.error.problem : null} />
      ) : null}
      <Row>
        <Button
          kind="second"
          label={t("columns.also.open")}
          busy={also.isPending}
          offBecause={pointId === null ? t("columns.also.needsPoint") : undefined}
          onPress={() => {
            if (pointId === null) return;
            also.mutate(pointId, {
              onSuccess: ({ id }) => router.push(importPaths.wizard(id, "columns")),
            });
          }}
        />
      </Row>
    </>
  );
}
