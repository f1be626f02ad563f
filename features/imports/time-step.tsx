import { useEffect } from "react";
import { useWords } from "@features/i18n";
import { Banner, Card, LoadingBlocks, Text } from "@features/ui";
import type { ImportDetail, ImportFile } from "@shared/contracts/imports";
import { ClockChoice } from "./clock-choice";
import { ClockNotes } from "./clock-notes";
import { withRecipe } from "./file-card";
import { FileCoverage } from "./file-coverage";
import type { ImportActions } from "./imports-queries";
import { withClock, withNotes } from "./recipe-edits";
import { SideColumn } from "./side-column";
import { SideRows, type SideRow } from "./side-rows";
import { TwoClocks } from "./two-clocks";

/** Step 3: which clock wrote the times, and what the files cover. */
export function TimeStep({ detail, actions }: { detail: ImportDetail; actions: ImportActions }) {
  const t = useWords("imports");
  useChecksWhenAnswered(detail, actions);
  const open = detail.files.some((file) => file.questions.length > 0);
  return (
    <SideColumn
      main={detail.files.map((file) => (
        <FileTime key={file.id} file={file} detail={detail} actions={actions} waiting={open} />
      ))}
      side={
        <>
          {detail.files.map((file) => (
            <Dates key={file.id} file={file} named={detail.files.length > 1} />
          ))}
          {detail.checks ? (
            <Banner kind="note">
              {t(
                detail.checks.files.some((file) => file.clockChangeInside)
                  ? "time.change.inside"
                  : "time.change.outside",
              )}
            </Banner>
          ) : null}
        </>
      }
    />
  );
}

/** Once nothing is asked any more, the whole import is tried without storing anything. */
export function useChecksWhenAnswered(detail: ImportDetail, actions: ImportActions): void {
  const { mutate, isPending, isError } = actions.check;
  const due =
    detail.can.edit &&
    detail.state === "asking" &&
    detail.checks === null &&
    detail.files.length > 0 &&
    detail.files.every((file) => file.recipe && file.questions.length === 0);
  useEffect(() => {
    if (due && !isPending && !isError) mutate();
  }, [due, isPending, isError, mutate]);
}

/** Rows that carry their own offset: their logger's face shows the site's time, as far as is known. */
const SITE_CLOCK = { kind: "site" } as const;

function FileTime(props: {
  file: ImportFile;
  detail: ImportDetail;
  actions: ImportActions;
  waiting: boolean;
}) {
  const { file, detail, actions } = props;
  const t = useWords("imports");
  const { recipe } = file;
  if (!recipe) return null;
  const checks = detail.checks?.files.find((entry) => entry.fileId === file.id) ?? null;
  const asksClock =
    recipe.time.clock !== null ||
    file.questions.some((question) => question.code === "loggerClock");
  return (
    <>
      <Card pad={5}>
        {detail.files.length > 1 ? <Text variant="asReadM">{file.name}</Text> : null}
        {asksClock ? (
          <ClockChoice
            label={
              detail.files.length > 1
                ? t("time.clock.forFile", { name: file.name })
                : t("time.clock.title")
            }
            zone={detail.site.zone}
            clock={recipe.time.clock}
            locked={!detail.can.edit}
            onChange={(clock) =>
              actions.chooseRecipe.mutate({
                fileId: file.id,
                recipe: withRecipe(withClock(recipe, clock)),
              })
            }
          />
        ) : (
          <Text tone="ink2">
            {t(
              recipe.time.format.kind === "calendar" ? "time.clock.notNeeded" : "time.clock.epoch",
            )}
          </Text>
        )}
        {checks?.firstRow && recipe.time.clock ? (
          <TwoClocks
            firstRow={checks.firstRow}
            clock={recipe.time.clock}
            siteZone={detail.site.zone}
          />
        ) : null}
      </Card>
      <ClockNotes
        key={`${file.id} ${JSON.stringify(recipe.time)}`}
        notes={recipe.time.notes ?? []}
        clock={recipe.time.clock ?? SITE_CLOCK}
        zone={detail.site.zone}
        locked={!detail.can.edit}
        onUse={(notes) =>
          actions.chooseRecipe.mutate({
            fileId: file.id,
            recipe: withRecipe(withNotes(recipe, notes)),
          })
        }
      />
      {checks ? (
        <FileCoverage
          name={file.name}
          named={detail.files.length > 1}
          zone={detail.site.zone}
          checks={checks}
        />
      ) : props.waiting ? (
        <Text tone="ink2">{t("time.covers.waiting")}</Text>
      ) : (
        <LoadingBlocks label={t("checks.working")} blocks={[{ width: "100%", height: 180 }]} />
      )}
    </>
  );
}

function Dates({ file, named }: { file: ImportFile; named: boolean }) {
  const t = useWords("imports");
  if (!file.recipe || !file.recognition) return null;
  const { format } = file.recipe.time;
  const order =
    format.kind === "calendar"
      ? format.order === null
        ? t("columns.order.choose")
        : t(`columns.order.${format.order}`)
      : t(`columns.order.${format.kind}`);
  const proof = file.recognition.proofs.find((entry) => entry.about === "dateOrder");
  const rows: SideRow[] = [{ label: t("time.dates.order"), value: order }];
  if (proof && proof.line !== null) {
    rows.push({
      label: t("time.dates.proof"),
      value: t("time.dates.proofLine", { line: proof.line, cell: proof.cell }),
      asRead: true,
    });
  } else if (format.kind === "calendar" && format.order !== null && !proof) {
    rows.push({ label: t("time.dates.proof"), value: t("time.dates.chosen") });
  }
  const century = file.recognition.proofs.find((entry) => entry.about === "century");
  if (century) {
    rows.push({
      label: t("time.dates.years"),
      value: t("time.dates.yearsShort", { cell: century.cell }),
    });
  }
  return <SideRows title={named ? file.name : t("time.dates.title")} rows={rows} />;
}
