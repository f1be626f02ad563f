import { View } from "react-native";
import type {
  ComparedSide,
  FigureAgreement,
  MeterComparisonResult,
} from "@shared/contracts/meter-comparisons";
import type { Quantity } from "@shared/domain/units/display-units";
import { useFormat, useWords } from "@features/i18n";
import {
  Banner,
  Card,
  DefinitionRows,
  Figure,
  Mark,
  MarkedText,
  Row,
  Table,
  Text,
  useBreakpoint,
  type Column,
} from "@features/ui";
import { ClassOrigin } from "./class-origin";
import { energyQuantityOf, jointExpanded, verdictMarks } from "./compare-words";
import { EnergyBars } from "./energy-bars";
import { FlowBands } from "./flow-bands";
import { shownFigure } from "./shown-figure";
import { StandInBlock } from "./stand-in-block";

/** What two meters say about each other: the words first, then the figures, then where they come from. */
export function ComparisonResult(props: {
  result: MeterComparisonResult;
  consentBy: string | null;
}) {
  const { result } = props;
  return (
    <View style={{ gap: 24 }}>
      <Verdict result={result} />
      <EnergyBars result={result} />
      <Figures result={result} />
      <Parts result={result} />
      <FlowBands result={result} />
      <ClassOrigin side={result.first} />
      <ClassOrigin side={result.second} />
      {result.standIn ? (
        <StandInBlock standIn={result.standIn} consentBy={props.consentBy} />
      ) : null}
      <Cautions result={result} />
    </View>
  );
}

interface Judged {
  readonly result: MeterComparisonResult;
}

function Verdict({ result }: Judged) {
  const t = useWords("compare");
  const { verdict, because, errorsCancel, first, second } = result;
  const nameOf = (reason: string) => (reason.startsWith("first") ? first.name : second.name);
  return (
    <View role="status" style={{ gap: 8 }}>
      <Row gap={3} align="flex-start">
        <View style={{ paddingTop: 2 }}>
          <Mark kind={verdictMarks[verdict]} size={22} silent />
        </View>
        <Text variant="heading" style={{ flex: 1 }}>
          {t(`verdict.${verdict}`)}
        </Text>
      </Row>
      {because.map((reason) => (
        <Text key={reason} tone="ink2">
          {t(`because.${reason}`, { name: nameOf(reason) })}
        </Text>
      ))}
      {errorsCancel ? (
        <Banner kind="look" lead={t("result.errorsCancelLead")}>
          {t("result.errorsCancel")}
        </Banner>
      ) : null}
    </View>
  );
}

function Figures({ result }: Judged) {
  const t = useWords("compare");
  const format = useFormat();
  const quantity = energyQuantityOf(result);
  const { energy, first, second } = result;
  const expanded = jointExpanded(first.energyKwh.expanded, second.energyKwh.expanded);
  const names = { first: first.name, second: second.name };
  const { ratio } = energy;
  const said = t("result.differenceSaid", names);
  return (
    <View style={{ gap: 12 }}>
      <View>
        <Text variant="small" tone="ink3" hidden>
          {said}
        </Text>
        <Figure
          {...shownFigure(format, energy.difference, expanded, quantity)}
          places={1}
          size="l"
          said={said}
        />
        {energy.differencePercent === null ? null : (
          <Text tone="ink2">
            {t("result.differencePercent", {
              percent: format.number(energy.differencePercent, 2),
              second: second.name,
            })}
          </Text>
        )}
      </View>
      <DefinitionRows
        label={t("result.title")}
        rows={[
          {
            label: t("result.en"),
            value: (
              <View>
                <Text variant="figureS">
                  {energy.en === null ? t("result.enNone") : format.number(energy.en, 2)}
                </Text>
                <Text variant="small" tone="ink3">
                  {t("result.enHint")}
                </Text>
              </View>
            ),
          },
          ...(ratio === null
            ? []
            : [{ label: t("result.ratio"), value: ratioWords(ratio, format.number, t) }]),
        ]}
      />
      <SidesTable result={result} />
    </View>
  );
}

function ratioWords(
  { value, expanded }: NonNullable<FigureAgreement["ratio"]>,
  number: (value: number | null, places?: number) => string,
  t: ReturnType<typeof useWords>,
): string {
  if (expanded === null) return number(value, 3);
  return t("result.ratioValue", {
    ratio: number(value, 3),
    low: number(value - expanded, 3),
    high: number(value + expanded, 3),
  });
}

/** The bars as a table, with what the ± is in percent and how much time stands behind a point. */
function SidesTable({ result }: Judged) {
  const t = useWords("compare");
  const format = useFormat();
  const phone = useBreakpoint() === "phone";
  const quantity = energyQuantityOf(result);
  const percent = ({ energyKwh }: ComparedSide) =>
    energyKwh.percent === null
      ? t("result.noClaim")
      : `±\u00A0${format.number(energyKwh.percent, 2)}\u00A0%`;
  const coverage = ({ point }: ComparedSide) =>
    point === null
      ? null
      : t("result.coverage", { percent: format.number(100 * point.coverage, 1) });
  const figureOf = ({ energyKwh }: ComparedSide) =>
    shownFigure(format, energyKwh.value, energyKwh.expanded, quantity);
  const columns: Column<ComparedSide>[] = [
    { key: "meter", header: t("result.meter"), render: ({ name }) => name },
    {
      key: "energy",
      header: t("result.energy"),
      unit: format.unit(quantity).unit,
      figure: figureOf,
    },
    { key: "percent", header: t("result.claim"), align: "right", render: percent },
  ];
  const sides = [result.first, result.second];
  const table = (
    <Table
      caption={t("result.figures")}
      captionHidden
      columns={columns}
      rows={sides}
      rowKey={(side) => (side === result.first ? "first" : "second")}
      card={{
        title: ({ name }) => name,
        figure: (side) => <Figure {...figureOf(side)} size="s" />,
        lines: (side) => [percent(side), coverage(side)],
      }}
    />
  );
  return (
    <View style={{ gap: 8 }}>
      <Text variant="heading">{t("result.figures")}</Text>
      {phone ? table : <Card pad={0}>{table}</Card>}
      {phone
        ? null
        : sides.map((side) => {
            const words = coverage(side);
            return words === null ? null : (
              <Text key={side.name} variant="small" tone="ink3">
                {side.name}: {words}
              </Text>
            );
          })}
    </View>
  );
}

interface Part {
  readonly key: "volume" | "deltaT";
  readonly quantity: Quantity;
  readonly first: ComparedSide["energyKwh"];
  readonly second: ComparedSide["energyKwh"];
  readonly agreement: FigureAgreement;
}

/** Flow and ΔT by themselves: good energy from bad parts shows here. */
function Parts({ result }: Judged) {
  const t = useWords("compare");
  const format = useFormat();
  const phone = useBreakpoint() === "phone";
  const parts = partsOf(result);
  if (parts.length === 0) return null;
  const { first, second } = result;
  const verdict = ({ agreement }: Part) => (
    <MarkedText kind={verdictMarks[agreement.code]} variant="table">
      {t(`verdictShort.${agreement.code}`)}
    </MarkedText>
  );
  const said = (known: Part["first"], { quantity }: Part) =>
    format.figure(known.value, known.expanded, quantity);
  const percent = ({ agreement }: Part) =>
    agreement.differencePercent === null
      ? "—"
      : `${format.number(agreement.differencePercent, 1)}\u00A0%`;
  const columns: Column<Part>[] = [
    { key: "quantity", header: t("result.partQuantity"), render: ({ key }) => t(`result.${key}`) },
    { key: "first", header: first.name, align: "right", render: (part) => said(part.first, part) },
    {
      key: "second",
      header: second.name,
      align: "right",
      render: (part) => said(part.second, part),
    },
    { key: "difference", header: t("result.difference"), align: "right", render: percent },
    { key: "verdict", header: t("result.verdict"), render: verdict },
  ];
  const table = (
    <Table
      caption={t("result.parts")}
      captionHidden
      columns={columns}
      rows={parts}
      rowKey={({ key }) => key}
      tone={({ agreement }) => (agreement.code === "disagree" ? "look" : null)}
      card={{
        title: ({ key }) => t(`result.${key}`),
        figure: percent,
        lines: (part) => [
          `${first.name}: ${said(part.first, part)}`,
          `${second.name}: ${said(part.second, part)}`,
          verdict(part),
        ],
      }}
    />
  );
  return (
    <View style={{ gap: 8 }}>
      <Text variant="heading">{t("result.parts")}</Text>
      {phone ? table : <Card pad={0}>{table}</Card>}
    </View>
  );
}

function partsOf({ first, second, volume, deltaT }: MeterComparisonResult): Part[] {
  const parts: Part[] = [];
  if (volume && first.volumeM3 && second.volumeM3)
    parts.push({
      key: "volume",
      quantity: "volume",
      first: first.volumeM3,
      second: second.volumeM3,
      agreement: volume,
    });
  if (deltaT && first.deltaTK && second.deltaTK)
    parts.push({
      key: "deltaT",
      quantity: "temperatureDifference",
      first: first.deltaTK,
      second: second.deltaTK,
      agreement: deltaT,
    });
  return parts;
}

function Cautions({ result }: Judged) {
  const t = useWords("compare");
  return (
    <View style={{ gap: 8 }}>
      <Text variant="heading">{t("result.cautions")}</Text>
      <View role="list" aria-label={t("result.cautions")} style={{ gap: 8 }}>
        {result.cautions.map((code) => (
          <View key={code} role="listitem" style={{ flexDirection: "row", gap: 8 }}>
            <Mark kind={looks.has(code) ? "look" : "note"} size={18} silent />
            <Text variant="bodyWide" style={{ flex: 1 }}>
              {t(`caution.${code}`)}
            </Text>
          </View>
        ))}
      </View>
    </View>
  );
}

const looks: ReadonlySet<string> = new Set([
  "consentMissing",
  "coverageBelow95",
  "deltaTBelowMinimum",
]);
