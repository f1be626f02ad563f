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
  return (
    <Link href={placesPaths.loop(shown.loop.id, monday)} asChild>
      <Pressable role="link" aria-label={useSaidRow(props)}>
        {phone ? <PhoneRow {...props} /> : <WideRow {...props} />}
      </Pressable>
    </Link>
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
  return `${head}: ${parts.join(", ")}`;
}

/** Never rounded up to 100 % while something is missing. */
function percent(coverage: number, format: Format): string {
  const tenths = coverage >= 1 ? 1000 : Math.min(999, Math.floor(coverage * 1000 + 1e-6));
  return `${format.number(tenths / 10, 1)}\u00A0%`;
}

function Energies({ shown, format, size }: RowProps & { size: "m" | "s" }) {
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
              size={size}
            />
          </View>
        );
      })}
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

function DeltaT({ shown, format }: RowProps) {
  const t = useWords("places");
  if (shown.flowWeightedDeltaTK === null) return null;
  return (
    <View style={{ flexDirection: "row", alignItems: "baseline", gap: 5 }}>
      <Text variant="small" tone="ink3">
        {t("overview.deltaT")}
      </Text>
      <Figure
        value={format.toDisplay(shown.flowWeightedDeltaTK, "temperatureDifference")}
        unit={format.unit("temperatureDifference").unit}
        places={1}
        size="s"
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
        {shown.coverage === null ? null : (
          <Text variant="table">{percent(shown.coverage, format)}</Text>
        )}
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
