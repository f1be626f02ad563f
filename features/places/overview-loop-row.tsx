import { Link } from "expo-router";
import { Pressable, View } from "react-native";
import type { z } from "zod";
import type { siteOverviewLoop } from "@shared/contracts/places";
import { useWords, type Format } from "@features/i18n";
import {
  Figure,
  Icon,
  LoopTag,
  Mark,
  QualityStrip,
  Text,
  useBreakpoint,
  type QualityStretch,
} from "@features/ui";
import { addDays } from "@shared/domain/time/local-calendar";
import type { PlusMinus } from "@shared/contracts/plus-minus";
import type { Quantity } from "@shared/domain/units/display-units";
import { useWorkings } from "@features/workings/use-workings";
import { placesPaths } from "./places-paths";
import { tagService } from "./service-words";

export type OverviewLoop = z.infer<typeof siteOverviewLoop>;

/** Under this share of covered time a loop's week needs a look. */
const WEAK_COVERAGE = 0.95;

export interface OverviewRange {
  readonly startMs: number;
  readonly endMs: number;
}

interface RowProps {
  readonly shown: OverviewLoop;
  readonly range: OverviewRange;
  readonly monday: string;
  readonly format: Format;
}

/** One loop of a building: its tag, the week's energy, ΔT and how well it is covered. */
export function OverviewLoopRow(props: RowProps) {
  const phone = useBreakpoint() === "phone";
  const { shown, monday } = props;
  // The link lies under the row and the figures on it: a button inside a link could not be reached.
  return (
    <View>
      <Link href={placesPaths.loop(shown.loop.id, monday)} asChild>
        <Pressable
          role="link"
          aria-label={useSaidRow(props)}
          style={{ position: "absolute", top: 0, right: 0, bottom: 0, left: 0 }}
        />
      </Link>
      <View pointerEvents="box-none">
        {phone ? <PhoneRow {...props} /> : <WideRow {...props} />}
      </View>
    </View>
  );
}

/** Energy as the service's register counts it; a changeover loop has two. */
function energiesOf({ loop, energyKwh, heatingKwh, coolingKwh }: OverviewLoop) {
  if (loop.service === "hot") return [{ kind: "heating", kwh: energyKwh }] as const;
  if (loop.service === "chilled") return [{ kind: "cooling", kwh: energyKwh }] as const;
  return [
    { kind: "heating", kwh: heatingKwh },
    { kind: "cooling", kwh: coolingKwh },
  ] as const;
}

const quantityOf = { heating: "heatingEnergy", cooling: "coolingEnergy" } as const;

/** Why a loop has no figure, in words; null where it has one. */
function useNoFigureReason({ loop, mainPointId, coverage, energyKwh, heatingKwh }: OverviewLoop) {
  const t = useWords("places");
  if (mainPointId === null) return t("overview.noPoint");
  if (loop.energyBlockedBy !== null) return t(`overview.${loop.energyBlockedBy}`);
  if (energyKwh !== null || heatingKwh !== null) return null;
  return coverage === null ? t("overview.noReadings") : t("overview.noEnergy");
}

function useSaidRow({ shown, format }: RowProps): string {
  const t = useWords("places");
  const reason = useNoFigureReason(shown);
  const head = `${shown.loop.tag}, ${shown.loop.name}`;
  if (reason !== null) return `${head}: ${reason}`;
  const parts = energiesOf(shown).map(({ kind, kwh }) =>
    t(`overview.said.${kind}`, { energy: format.withUnit(kwh, quantityOf[kind]) }),
  );
  if (shown.flowWeightedDeltaTK !== null)
    parts.push(
      t("overview.said.deltaT", {
        deltaT: format.withUnit(shown.flowWeightedDeltaTK, "temperatureDifference", 1),
      }),
    );
  if (shown.coverage !== null)
    parts.push(t("overview.said.coverage", { part: percent(shown.coverage, format) }));
  if (isFilled(shown)) parts.push(t("overview.said.filled", { part: filledPart(shown, format) }));
  return `${head}: ${parts.join(", ")}`;
}

/** Never rounded up to 100 % while something is missing. */
function percent(coverage: number, format: Format): string {
  const tenths = coverage >= 1 ? 1000 : Math.min(999, Math.floor(coverage * 1000 + 1e-6));
  return `${format.number(tenths / 10, 1)}\u00A0%`;
}

/** Under this share nothing would be left of it in writing. */
const LEAST_FILLED = 0.0005;

const isFilled = ({ filledShare }: OverviewLoop) => (filledShare ?? 0) >= LEAST_FILLED;

function filledPart({ filledShare }: OverviewLoop, format: Format): string {
  return `${format.number(100 * (filledShare ?? 0), 1)}\u00A0%`;
}

/** What the strip's estimated part comes to; nothing where nothing is filled. */
function Filled({ shown, format }: RowProps) {
  const t = useWords("places");
  if (!isFilled(shown)) return null;
  return (
    <Text variant="small" tone="ink3">
      {t("overview.said.filled", { part: filledPart(shown, format) })}
    </Text>
  );
}

function Energies({ shown, format, monday, size }: RowProps & { size: "m" | "s" }) {
  const t = useWords("places");
  const workings = useWorkings();
  const pointId = shown.mainPointId;
  const energies = energiesOf(shown);
  return (
    <View style={{ gap: 2, alignItems: size === "s" ? "flex-end" : "flex-start" }}>
      {energies.map(({ kind, kwh }) => {
        const quantity = quantityOf[kind];
        return (
          <View key={kind} style={{ flexDirection: "row", alignItems: "center", gap: 8 }}>
            {energies.length > 1 ? <RegisterWord kind={kind} /> : null}
            <Figure
              value={kwh === null ? null : format.toDisplay(kwh, quantity)}
              unit={format.unit(quantity).unit}
              uncertainty={expandedIn(shown.plusMinus?.[kind].energy, format, quantity)}
              said={`${shown.loop.tag}, ${t(`register.${kind}`)}`}
              size={size}
              {...(kwh === null || pointId === null
                ? {}
                : {
                    onOpenWorkings: () =>
                      workings.show({
                        figure: "energy",
                        register: kind,
                        pointId,
                        from: monday,
                        to: addDays(monday, 7),
                      }),
                  })}
            />
          </View>
        );
      })}
      {shown.plusMinus?.lacks === "meterClass" && energies.some(({ kwh }) => (kwh ?? 0) > 0) ? (
        <Text variant="small" tone="ink3">
          {t("overview.noMeterClass")}
        </Text>
      ) : null}
    </View>
  );
}

function RegisterWord({ kind }: { kind: "heating" | "cooling" }) {
  const t = useWords("places");
  return (
    <Text variant="small" tone={kind === "heating" ? "copper" : "verdigris"}>
      {t(`register.${kind}`)}
    </Text>
  );
}

/** The ± in the unit the figure is shown in; null where there is none. */
function expandedIn(
  plusMinus: PlusMinus | null | undefined,
  format: Format,
  quantity: Quantity,
): number | null {
  return plusMinus ? plusMinus.expanded * format.unit(quantity).factor : null;
}

function DeltaT({ shown, format, monday }: RowProps) {
  const t = useWords("places");
  const workings = useWorkings();
  const pointId = shown.mainPointId;
  const register = shown.loop.service === "hot" ? "heating" : "cooling";
  if (shown.flowWeightedDeltaTK === null) return null;
  return (
    <View style={{ flexDirection: "row", alignItems: "baseline", gap: 5 }}>
      <Text variant="small" tone="ink3">
        {t("overview.deltaT")}
      </Text>
      <Figure
        value={format.toDisplay(shown.flowWeightedDeltaTK, "temperatureDifference")}
        unit={format.unit("temperatureDifference").unit}
        uncertainty={expandedIn(
          shown.plusMinus?.[register].deltaT,
          format,
          "temperatureDifference",
        )}
        places={1}
        said={`${shown.loop.tag}, ${t("overview.deltaT")}`}
        size="s"
        {...(pointId === null
          ? {}
          : {
              onOpenWorkings: () =>
                workings.show({
                  figure: "deltaT",
                  register,
                  pointId,
                  from: monday,
                  to: addDays(monday, 7),
                }),
            })}
      />
    </View>
  );
}

function Strip({ shown, range, height }: RowProps & { height: number }) {
  const t = useWords("places");
  const length = range.endMs - range.startMs;
  const stretches: QualityStretch[] = shown.quality.map(({ from, to, kind }) => ({
    from: (Date.parse(from) - range.startMs) / length,
    to: (Date.parse(to) - range.startMs) / length,
    quality: kind === "filled" ? "estimated" : kind,
  }));
  return <QualityStrip label={t("overview.quality")} stretches={stretches} height={height} />;
}

function WideRow(props: RowProps) {
  const { shown, format } = props;
  const reason = useNoFigureReason(shown);
  const wide = useBreakpoint() === "wide";
  const weak = shown.coverage !== null && shown.coverage < WEAK_COVERAGE;
  return (
    <View style={{ flexDirection: "row", alignItems: "center", gap: 16, minHeight: 56 }}>
      <View style={{ width: 92 }}>
        <LoopTag tag={shown.loop.tag} service={tagService(shown.loop.service)} />
      </View>
      {reason === null ? (
        <>
          <View style={{ flexGrow: 2, flexBasis: 130, paddingVertical: 6 }}>
            <Energies {...props} size="m" />
          </View>
          <View style={{ width: 104 }}>
            <DeltaT {...props} />
          </View>
        </>
      ) : (
        <View style={{ flexGrow: 2, flexBasis: 234 }}>
          <Text tone="ink2">{reason}</Text>
        </View>
      )}
      {wide && shown.quality.length > 0 ? (
        <View style={{ width: 190 }}>
          <Strip {...props} height={14} />
        </View>
      ) : null}
      <View
        style={{
          width: 96,
          flexDirection: "row",
          gap: 6,
          alignItems: "center",
          justifyContent: "flex-end",
        }}
      >
        {weak ? <Mark kind="look" size={16} /> : null}
        <View style={{ alignItems: "flex-end" }}>
          {shown.coverage === null ? null : (
            <Text variant="table">{percent(shown.coverage, format)}</Text>
          )}
          <Filled {...props} />
        </View>
      </View>
      <View style={{ flexGrow: 1, alignItems: "flex-end" }}>
        <Icon name="right" size={20} />
      </View>
    </View>
  );
}

function PhoneRow(props: RowProps) {
  const { shown } = props;
  const reason = useNoFigureReason(shown);
  const weak = shown.coverage !== null && shown.coverage < WEAK_COVERAGE;
  return (
    <View
      style={{
        flexDirection: "row",
        justifyContent: "space-between",
        gap: 10,
        minHeight: 62,
        paddingVertical: 8,
        alignItems: "center",
      }}
    >
      <View style={{ gap: 6, flexShrink: 1 }}>
        <View style={{ flexDirection: "row", alignItems: "center", gap: 8 }}>
          <LoopTag tag={shown.loop.tag} service={tagService(shown.loop.service)} size="s" />
          {weak ? <Mark kind="look" size={16} /> : null}
        </View>
        {shown.quality.length > 0 ? (
          <View style={{ width: 104 }}>
            <Strip {...props} height={12} />
          </View>
        ) : null}
        <Filled {...props} />
      </View>
      {reason === null ? (
        <View style={{ alignItems: "flex-end", gap: 2 }}>
          <Energies {...props} size="s" />
          <DeltaT {...props} />
        </View>
      ) : (
        <Text variant="small" tone="ink2" align="right" style={{ flexShrink: 1 }}>
          {reason}
        </Text>
      )}
    </View>
  );
}
