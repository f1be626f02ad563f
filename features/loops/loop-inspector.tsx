import { useState, type ReactNode } from "react";
import { View } from "react-native";

import { useWords } from "@features/i18n";
import { Button, Row, SelectField, Strong, Text, TextLink, useTheme } from "@features/ui";

import { correctionsPaths } from "@features/corrections/corrections-paths";

import { FluidSection } from "./fluid-section";
import type { LoopFigures, LoopView } from "./loop-context";
import { loopsPaths } from "./loops-paths";
import { MeasuredBySection } from "./measured-by-section";
import { PipeSection, places } from "./pipe-section";
import { lastDayOf } from "./shown-range";
import { tagService } from "./register-words";

/** What the figures stand on: the pipe, the points of the loop, the rows left out. */
export function LoopInspector(
  props: LoopView & { summary: LoopFigures["summary"] | null; onPoint: (pointId: string) => void },
) {
  const { points, point, summary, site, loop } = props;
  const t = useWords("loops");
  return (
    <View style={{ gap: 18 }}>
      <Pipe {...props} />
      <FluidSection loop={loop} format={props.format} />
      {points.length > 1 ? (
        <SelectField
          label={t("inspector.point")}
          value={point.id}
          options={points.map(({ id, code, name }) => ({ value: id, label: `${code}, ${name}` }))}
          onChange={props.onPoint}
        />
      ) : null}
      {summary ? <MeasuredBySection {...props} summary={summary} /> : null}
      {summary ? <LeftOut {...props} summary={summary} /> : null}
      <TextLink
        label={t("inspector.corrections")}
        href={correctionsPaths.corrections({
          siteId: site.id,
          loopId: loop.id,
          pointId: point.id,
        })}
      />
      <Row gap={3} wrap>
        {point.can.import ? (
          <Button
            kind="second"
            size="dense"
            icon="download"
            label={t("import")}
            href={loopsPaths.importLog(point.id)}
          />
        ) : null}
        {point.can.edit ? (
          <Button
            kind="second"
            size="dense"
            label={t("inspector.editPoint")}
            href={loopsPaths.point(site.id, loop.id, point.id)}
          />
        ) : null}
      </Row>
    </View>
  );
}

function Pipe({ point, loop, format }: LoopView) {
  const t = useWords("loops");
  const { bore } = point;
  const size = (mm: number) => format.withUnit(mm, "pipeSize", places(format));
  const rows: readonly (readonly [string, string])[] = [
    ...(bore
      ? ([
          [t("pipe.outside"), size(bore.outsideDiameterMm)],
          [t("pipe.wall"), size(bore.wallMm)],
          ...(bore.liningMm > 0 ? ([[t("pipe.lining"), size(bore.liningMm)]] as const) : []),
          [t("pipe.pipe"), bore.label],
        ] as const)
      : ([[t("pipe.pipe"), t("pipe.unknown")]] as const)),
    [t("pipe.meterIn"), t(`pipe.leg.${point.meterSide}`)],
  ];
  return (
    <Row gap={4} align="center">
      {bore ? <PipeSection bore={bore} service={tagService(loop.service)} format={format} /> : null}
      <View role="list" aria-label={t("pipe.label")} style={{ flex: 1, minWidth: 0, gap: 4 }}>
        {rows.map(([label, value]) => (
          <View key={label} role="listitem" style={{ flexDirection: "row", gap: 10 }}>
            <View style={{ width: 60 }}>
              <Text variant="table" tone="ink3">
                {label}
              </Text>
            </View>
            <View style={{ flex: 1, minWidth: 0 }}>
              <Text variant="figureS">{value}</Text>
            </View>
          </View>
        ))}
      </View>
    </Row>
  );
}

/** More than these hide what stands below them. */
const fewRuns = 8;

/** The longest stretches that do not count, in order of time. */
function LeftOut(props: LoopFigures) {
  const { summary, format } = props;
  const t = useWords("loops");
  const [all, setAll] = useState(false);
  const shown = all ? summary.leftOut : summary.leftOut.slice(0, fewRuns);
  const more = summary.leftOutCount - summary.leftOut.length;
  return (
    <View>
      <Text variant="subhead" level={3} style={{ marginBottom: 6 }}>
        {t("leftOut.title")}
      </Text>
      {summary.leftOut.length === 0 ? (
        <Line>
          <Text tone="ink2">{t("leftOut.none")}</Text>
        </Line>
      ) : (
        <View role="list" aria-label={t("leftOut.title")}>
          {shown.map((run) => {
            const from = Date.parse(run.from);
            const to = Date.parse(run.to);
            const sameDay = format.date(from) === format.date(to);
            const end = sameDay ? format.time(to) : format.dateTime(to);
            return (
              <View role="listitem" key={run.from}>
                <Line>
                  <View style={{ width: 44, alignItems: "flex-end" }}>
                    <Text variant="asReadM">
                      {run.rows === null ? "" : format.number(run.rows, 0)}
                    </Text>
                  </View>
                  <View style={{ flex: 1, minWidth: 0 }}>
                    <Text>
                      <Strong>{t(`leftOut.kind.${run.kind}`)}</Strong>
                      {t("leftOut.when", { from: format.dateTime(from), to: end })}
                    </Text>
                    <Text variant="small" tone="ink3">
                      {t(`leftOut.reason.${run.reason}`)}
                    </Text>
                    <WayOn {...props} run={run} />
                  </View>
                </Line>
              </View>
            );
          })}
        </View>
      )}
      {shown.length < summary.leftOut.length ? (
        <Line>
          <TextLink
            variant="small"
            label={t("leftOut.all", { count: summary.leftOut.length })}
            onPress={() => setAll(true)}
          />
        </Line>
      ) : more > 0 ? (
        <Line>
          <Text variant="small" tone="ink2">
            {t("leftOut.more", { count: more })}
          </Text>
        </Line>
      ) : null}
    </View>
  );
}

/** What may be done about a stretch: see what fills it, fill it, or leave all of it out. */
function WayOn(props: LoopFigures & { run: LoopFigures["summary"]["leftOut"][number] }) {
  const { run, summary, site, loop, point, range, format } = props;
  const t = useWords("loops");
  const place = { siteId: site.id, loopId: loop.id, pointId: point.id };
  const days = { since: range.from, until: lastDayOf(range) };
  const when = format.dateTime(Date.parse(run.from));
  if (run.kind === "filled")
    return (
      <TextLink
        variant="small"
        label={t("leftOut.seeFill")}
        said={t("leftOut.seeFillOf", { when })}
        href={correctionsPaths.fills(place, days)}
      />
    );
  if (!summary.can.correct) return null;
  const span = { startMs: Date.parse(run.from), endMs: Date.parse(run.to) };
  return (
    <Row gap={3} wrap>
      {run.reason === "weakSignal" ? (
        <TextLink
          variant="small"
          label={t("leftOut.exclude")}
          said={t("leftOut.excludeOf", { when })}
          href={correctionsPaths.exclude(place, span)}
        />
      ) : null}
      <TextLink
        variant="small"
        label={t("leftOut.fill")}
        said={t("leftOut.fillOf", { when })}
        href={correctionsPaths.fill(place, run, days)}
      />
    </Row>
  );
}

function Line({ children }: { children: ReactNode }) {
  const { colour } = useTheme();
  return (
    <View
      style={{
        flexDirection: "row",
        gap: 12,
        paddingVertical: 9,
        borderTopWidth: 1,
        borderTopColor: colour.rule,
      }}
    >
      {children}
    </View>
  );
}
