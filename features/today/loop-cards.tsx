import { Link } from "expo-router";
import { Pressable, View } from "react-native";

import type { TodayAnswer } from "@shared/contracts/energy";
import { useWords, type Format } from "@features/i18n";
import {
  Card,
  Icon,
  LoopCard,
  LoopTag,
  Row,
  Text,
  useBreakpoint,
  type LoopCardProps,
  type MarkKind,
  type ShownValue,
} from "@features/ui";
import { addDays } from "@shared/domain/time/local-calendar";
import type { PlusMinus } from "@shared/contracts/plus-minus";
import type { Quantity } from "@shared/domain/units/display-units";
import { useWorkings } from "@features/workings/use-workings";

import { tagService } from "./tag-service";
import { todayPaths } from "./today-paths";

type TodayLoop = TodayAnswer["loops"][number];

/** A loop card for each loop of the site, over the last whole day. */
export function LoopCards({ today, format }: { today: TodayAnswer; format: Format }) {
  const t = useWords("today");
  const phone = useBreakpoint() === "phone";
  const { day, loops } = today;
  return (
    <View>
      <Row justify="space-between" wrap style={{ marginBottom: 12 }}>
        <Text variant="heading" level={2}>
          {day === null ? t("loops") : t("loopsOn", { day: format.day(day, "weekdayDay") })}
        </Text>
        {day === null ? null : (
          <Text variant="small" tone="ink3">
            {t("note")}
          </Text>
        )}
      </Row>
      <View role="list" style={{ flexDirection: "row", flexWrap: "wrap", gap: phone ? 12 : 16 }}>
        {loops.map((loop) => (
          <View
            key={loop.loop.id}
            role="listitem"
            style={{ flexGrow: 1, flexBasis: phone ? "100%" : "45%", minWidth: phone ? 0 : 340 }}
          >
            <OneLoop loop={loop} day={day} format={format} />
          </View>
        ))}
      </View>
    </View>
  );
}

function OneLoop({
  loop: item,
  day,
  format,
}: {
  loop: TodayLoop;
  day: string | null;
  format: Format;
}) {
  const t = useWords("today");
  const { loop } = item;
  const workings = useWorkings();
  const service = tagService(loop.service);
  const place = loop.isMain
    ? loop.buildingName
      ? t("main", { place: loop.buildingName })
      : t("mainAlone")
    : (loop.buildingName ?? loop.name);
  return (
    <Card pad={3}>
      <Link href={todayPaths.loop(loop.id)} asChild>
        <Pressable role="link" aria-label={`${t("openLoop", { tag: loop.tag })}: ${loop.name}`}>
          <Row justify="space-between">
            <Row gap={3} grow>
              <LoopTag tag={loop.tag} service={service} />
              <View style={{ flex: 1, minWidth: 0 }}>
                <Text variant="subhead" level={3} numberOfLines={1}>
                  {place}
                </Text>
              </View>
            </Row>
            <Icon name="right" size={18} />
          </Row>
        </Pressable>
      </Link>
      <View style={{ marginTop: 8 }}>
        <LoopCard
          {...drawn(item, day, format)}
          {...openers()}
          service={service}
          {...emptyOf(item)}
        />
      </View>
    </Card>
  );

  function openers(): Pick<LoopCardProps, "powerWorkings" | "energyWorkings"> {
    const { pointId, card } = item;
    if (pointId === null || card === null || day === null) return {};
    const { register } = card;
    const key = { register, pointId, from: day, to: addDays(day, 1) };
    return {
      powerWorkings: { onOpenWorkings: () => workings.show({ figure: "power", ...key }) },
      energyWorkings: { onOpenWorkings: () => workings.show({ figure: "energy", ...key }) },
    };
  }

  function emptyOf({ card, emptyReason, lastReadingAt }: TodayLoop): Pick<LoopCardProps, "empty"> {
    if (card !== null) return {};
    const reason = emptyReason ?? "noReadings";
    const kinds: Partial<Record<typeof reason, MarkKind>> = {
      noReadingInFile: "wrong",
      noReadingsThatDay: "wrong",
      concentration: "look",
      pressure: "look",
    };
    return {
      empty: {
        kind: kinds[reason] ?? "note",
        title: t(`empty.${reason}.title`),
        detail: t(`empty.${reason}.detail`, {
          since: lastReadingAt === null ? "" : format.dateTime(Date.parse(lastReadingAt)),
        }),
      },
    };
  }
}

function drawn(
  item: TodayLoop,
  day: string | null,
  format: Format,
): Omit<LoopCardProps, "service"> {
  const { card, energyKwh, energyPlusMinus, nominalSizeDn, meterSide } = item;
  const base = { nominalMm: nominalSizeDn, meterSide: meterSide ?? "return" } as const;
  if (card === null) return base;
  const shown = (
    stored: number | null,
    quantity: Quantity,
    places?: number,
    plusMinus: PlusMinus | null = null,
  ): ShownValue => ({
    value: stored === null ? null : format.toDisplay(stored, quantity),
    unit: format.unit(quantity).unit,
    uncertainty: plusMinus && plusMinus.expanded * format.unit(quantity).factor,
    ...(places === undefined ? {} : { places }),
  });
  const heating = card.register === "heating";
  return {
    ...base,
    doing: card.register,
    supply: shown(card.supplyC, "temperature", 2),
    return: shown(card.returnC, "temperature", 2),
    flow: shown(card.flowM3PerHour, "flow", 1),
    power: shown(card.powerKw, heating ? "heatingPower" : "coolingPower", 1, card.plusMinus),
    deltaT: shown(card.deltaTK, "temperatureDifference", 1),
    energy: shown(
      energyKwh,
      heating ? "heatingEnergy" : "coolingEnergy",
      undefined,
      energyPlusMinus,
    ),
    ...(day === null ? {} : { energyLabel: format.day(day, "weekdayShort") }),
  };
}
