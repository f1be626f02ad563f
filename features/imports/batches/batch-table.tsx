import type { BatchDetail, BatchFile } from "@shared/contracts/import-batches";
import { useFormat, useWords } from "@features/i18n";
import { Button, Row, Table } from "@features/ui";
import { importPaths } from "../import-paths";
import { PointCell, ProblemsCell, StateCell, useSpanWords } from "./batch-cells";
import type { BatchActions } from "./batch-queries";

/** The report of a batch: one file a row. */
export function BatchTable({ batch, actions }: { batch: BatchDetail; actions: BatchActions }) {
  const t = useWords("batches");
  const format = useFormat(batch.site.zone);
  const span = useSpanWords(batch.site.zone);
  const count = (pick: (rows: NonNullable<BatchFile["rows"]>) => number) => (file: BatchFile) =>
    file.rows ? format.number(pick(file.rows), 0) : "—";
  const energy = (name: "heating" | "cooling") => ({
    key: name,
    header: t(`columns.${name}`),
    unit: format.unit(`${name}Energy`).unit,
    figure: (file: BatchFile) => {
      const { factor } = format.unit(`${name}Energy`);
      const found = file[name];
      const expanded = found?.expandedKwh ?? null;
      return {
        value: found ? found.kwh * factor : null,
        uncertainty: expanded === null ? null : expanded * factor,
      };
    },
  });
  const has = (name: "heating" | "cooling") => batch.files.some((file) => file[name] !== null);
  return (
    <Table
      caption={t("one.caption")}
      captionHidden
      rows={batch.files}
      rowKey={({ id }) => id}
      href={({ importId }) => (importId === null ? null : importPaths.wizard(importId))}
      tone={(file) =>
        file.state === "failed" ? "wrong" : file.problems.length > 0 ? "look" : null
      }
      columns={[
        { key: "file", header: t("columns.file"), render: ({ name }) => name },
        {
          key: "point",
          header: t("columns.point"),
          width: 230,
          render: (file) => <PointCell file={file} batch={batch} actions={actions} />,
        },
        {
          key: "state",
          header: t("columns.state"),
          render: (file) => (
            <Row>
              <StateCell file={file} />
            </Row>
          ),
        },
        {
          key: "rows",
          header: t("columns.rows"),
          align: "right",
          asRead: count(({ used }) => used),
        },
        {
          key: "left",
          header: t("columns.left"),
          align: "right",
          asRead: count(({ leftOut }) => leftOut),
          wideOnly: true,
        },
        {
          key: "excluded",
          header: t("columns.excluded"),
          align: "right",
          asRead: count(({ excluded }) => excluded),
          wideOnly: true,
        },
        { key: "span", header: t("columns.span"), render: span, wideOnly: true },
        ...(has("heating") ? [energy("heating")] : []),
        ...(has("cooling") ? [energy("cooling")] : []),
        {
          key: "problems",
          header: t("columns.problems"),
          render: (file) => <ProblemsCell file={file} />,
        },
        {
          key: "remove",
          header: "",
          render: (file) =>
            file.can.remove ? (
              <Button
                kind="quiet"
                size="dense"
                iconOnly
                icon="close"
                label={t("one.remove", { name: file.name })}
                onPress={() => actions.remove.send(file.id)}
              />
            ) : null,
        },
      ]}
      card={{ title: ({ name }) => name }}
    />
  );
}
