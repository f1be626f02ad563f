import { View } from "react-native";

import { useFluidWords, useWords } from "@features/i18n";
import { Banner, Figure, Row, Text, TextLink, useBreakpoint } from "@features/ui";

import type { WorkingsKey } from "@features/workings/workings-key";

import { evidencePaths } from "@features/evidence/evidence-paths";
import { correctionsPaths } from "@features/corrections/corrections-paths";
import type { FiguresWithWorkings, LoopFigures } from "./loop-context";
import { energyQuantity, registersOf, type RegisterName } from "./register-words";
import { shownFigure } from "./shown-figure";
import { lastDayOf } from "./shown-range";

/** A register beside the loop's own is named once it holds this share of it. */
const remarkableShare = 0.001;

/** Measured energy of the range, each register by itself, and how much time stands behind it. */
export function Headline(props: FiguresWithWorkings) {
  const { loop, summary } = props;
  const t = useWords("loops");
  const phone = useBreakpoint() === "phone";
  const registers = registersOf(loop.service);
  if (summary.basis.blockedBy) return <Blocked {...props} reason={summary.basis.blockedBy} />;
  return (
    <View>
      <Row gap={8} wrap align="flex-start">
        {registers.map((register) => (
          <RegisterFigure
            key={register}
            {...props}
            register={register}
            alone={registers.length === 1}
          />
        ))}
      </Row>
      <View style={{ marginTop: phone ? 4 : 6, gap: 2 }}>
        <Text variant="small" tone="ink3">
          <CoveredWords {...props} />
        </Text>
        <OtherRegister {...props} shown={registers} />
        <RegisterTimes {...props} />
        <Suppressed {...props} />
        <Filled {...props} />
        {summary.basis.rowsAgainstRegister > 0 ? (
          <Text variant="small" tone="ink2">
            {t("headline.against", { count: summary.basis.rowsAgainstRegister })}
          </Text>
        ) : null}
        {registers.some((register) => lacksPlusMinus(props, register)) ? (
          <WithoutPlusMinus {...props} />
        ) : null}
        {summary.basis.meansOnly ? (
          <Text variant="small" tone="ink3">
            {t("headline.meansOnly")}
          </Text>
        ) : null}
        {summary.basis.recalculating ? (
          <Text variant="small" tone="brass" role="status">
            {t("headline.recalculating")}
          </Text>
        ) : null}
      </View>
    </View>
  );
}

function RegisterFigure(props: FiguresWithWorkings & { register: RegisterName; alone: boolean }) {
  const { register, summary, format, rangeName } = props;
  const t = useWords("loops");
  const title = t(`headline.energy.${register}`, { range: rangeName });
  const energy = summary.totals[register].energyKwh;
  const plusMinus = summary.plusMinus[register].energy;
  // A loop with one register needs not name it.
  const key: WorkingsKey = props.alone ? { figure: "energy" } : { figure: "energy", register };
  return (
    <View>
      <Text variant="small" tone="ink3" hidden>
        {title}
      </Text>
      <Figure
        {...shownFigure(format, energy, energyQuantity[register], undefined, plusMinus)}
        size={props.alone ? "xl" : "l"}
        said={title}
        {...props.workings.figure(key)}
      />
    </View>
  );
}

/** Energy without a ±, as of a permanent meter nobody recorded a class of: said, never left blank. */
function lacksPlusMinus({ summary }: LoopFigures, register: RegisterName): boolean {
  const energy = summary.totals[register].energyKwh;
  return energy !== null && energy > 0 && summary.plusMinus[register].energy === null;
}

/** Why there is no ±, and the way to where it can be recorded. */
function WithoutPlusMinus({ summary, site, loop, point }: LoopFigures) {
  const t = useWords("loops");
  if (summary.plusMinus.lacks !== "meterClass")
    return (
      <Text variant="small" tone="ink3">
        {t("headline.noPlusMinus")}
      </Text>
    );
  return (
    <Row gap={3} wrap>
      <Text variant="small" tone="ink2">
        {t("headline.noMeterClass")}
      </Text>
      {summary.evidence === null ? null : (
        <TextLink
          variant="small"
          label={t("headline.recordClass")}
          href={
            summary.evidence.can.record && summary.evidence.installations.length === 0
              ? evidencePaths.newInstallation(site.id, loop.id, point.id)
              : evidencePaths.evidence(site.id, loop.id, point.id)
          }
        />
      )}
    </Row>
  );
}

function CoveredWords({ summary, format }: LoopFigures) {
  const t = useWords("loops");
  const { coveredS, expectedS, coverage } = summary.totals;
  const hours = (seconds: number) => format.number(seconds / 3600, seconds % 3600 < 1 ? 0 : 1);
  if (coveredS === 0) return t("headline.coversNothing");
  if (coverage !== null && coverage >= 0.9995)
    return t("headline.coversAll", { hours: hours(expectedS) });
  return t("headline.covers", { hours: hours(coveredS), of: hours(expectedS) });
}

function OtherRegister(props: LoopFigures & { shown: readonly RegisterName[] }) {
  const { shown, summary, format } = props;
  const t = useWords("loops");
  const [only] = shown;
  if (shown.length !== 1 || only === undefined) return null;
  const other = only === "heating" ? "cooling" : "heating";
  const energy = summary.totals[other].energyKwh ?? 0;
  if (energy <= remarkableShare * Math.max(summary.totals[only].energyKwh ?? 0, 1)) return null;
  return (
    <Text variant="small" tone="ink2">
      {t(`headline.other.${other}`, { energy: format.withUnit(energy, energyQuantity[other]) })}
    </Text>
  );
}

/** On a changeover loop: how long each register ran, and for how long neither did. */
function RegisterTimes({ summary, loop, format }: LoopFigures) {
  const t = useWords("loops");
  const { heating, cooling, coveredS } = summary.totals;
  if (loop.service !== "changeover" || coveredS === 0) return null;
  const neitherS = Math.max(0, coveredS - heating.runningS - cooling.runningS);
  return (
    <Text variant="small" tone="ink2">
      {t("headline.registerTimes", {
        heating: format.duration(heating.runningS),
        cooling: format.duration(cooling.runningS),
        neither: format.duration(neitherS),
      })}
    </Text>
  );
}

/** What stands filled in the range: beside the figure, never in it. */
function Filled({ summary, format, site, loop, point, range }: LoopFigures) {
  const t = useWords("loops");
  const { filled } = summary.totals;
  if (filled === null) return null;
  const own = registersOf(loop.service);
  const registers = (["heating", "cooling"] as const).filter(
    (register) => own.includes(register) || filled[`${register}Kwh`] > 0,
  );
  const energies = registers.map((register) => {
    const energy = format.figure(
      filled[`${register}Kwh`],
      filled[`${register}ExpandedKwh`],
      energyQuantity[register],
    );
    return registers.length === 1 ? energy : t(`headline.filledOf.${register}`, { energy });
  });
  return (
    <TextLink
      variant="small"
      label={t(filled.approvedOnly ? "headline.filledApproved" : "headline.filledProposed", {
        energy: energies.join(", "),
        time: format.duration(filled.filledS),
      })}
      href={correctionsPaths.fills(
        { siteId: site.id, loopId: loop.id, pointId: point.id },
        { since: range.from, until: lastDayOf(range) },
      )}
    />
  );
}

function Suppressed({ summary, format, loop }: LoopFigures) {
  const t = useWords("loops");
  const { suppressedKwh, suppressedS } = summary.totals;
  if (suppressedS === 0) return null;
  const quantity = loop.service === "hot" ? "heatingEnergy" : "coolingEnergy";
  return (
    <Text variant="small" tone="ink2">
      {t("headline.suppressed", {
        energy: format.withUnit(suppressedKwh, quantity),
        time: format.duration(suppressedS),
      })}
    </Text>
  );
}

/** Readings without energy: the reason, what still holds, and the way to change it. */
function Blocked(
  props: LoopFigures & { reason: NonNullable<LoopFigures["summary"]["basis"]["blockedBy"]> },
) {
  const { reason, loop, point, site, format } = props;
  const { basis } = props.summary;
  const t = useWords("loops");
  const fluidWords = useFluidWords();
  const ways = {
    concentration: editWay(),
    pressure: editWay(),
    outsideFluid: editWay(),
    noFlow: importWay(),
    noTemperature: importWay(),
    powerRegister: undefined,
  } as const;
  function editWay() {
    return loop.can.edit ? (
      <TextLink
        label={t("blocked.editLoop")}
        href={`/sites/${site.id}/loops/${loop.id}/edit`}
        variant="small"
      />
    ) : undefined;
  }
  function importWay() {
    return point.can.import ? (
      <TextLink label={t("import")} href={`/logs/new?point=${point.id}`} variant="small" />
    ) : undefined;
  }
  return (
    <View style={{ gap: 8 }}>
      <Banner kind="look" lead={t(`blocked.${reason}.title`)} action={ways[reason]}>
        {t(`blocked.${reason}.detail`, {
          fluid: fluidWords(basis.fluid),
          lowest: format.withUnit(basis.liquidC?.lowest ?? null, "temperature", 1),
          highest: format.withUnit(basis.liquidC?.highest ?? null, "temperature", 1),
        })}
      </Banner>
      <Text variant="small" tone="ink3">
        <CoveredWords {...props} />
      </Text>
    </View>
  );
}
