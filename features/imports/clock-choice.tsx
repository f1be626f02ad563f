import { useState } from "react";
import { View } from "react-native";
import { useWords } from "@features/i18n";
import { Button, ChoiceTiles, NumberField, Row, SelectField, useBreakpoint } from "@features/ui";
import type { LoggerClock } from "@shared/domain/log-files/recipe";
import { zoneOffsets } from "@shared/domain/time/zone-offsets";

type Kind = LoggerClock["kind"];

const HALF_YEAR_MS = 182 * 86_400_000;
const CHECK_FROM_MS = Date.UTC(2026, 0, 10);

/** “London” of Europe/London. */
export const placeOf = (zone: string): string => (zone.split("/").pop() ?? zone).replace(/_/g, " ");

function movesWithSummer(zone: string): boolean {
  const offsets = zoneOffsets(zone);
  return offsets.offsetAt(CHECK_FROM_MS) !== offsets.offsetAt(CHECK_FROM_MS + HALF_YEAR_MS);
}

interface ClockChoiceProps {
  readonly label: string;
  readonly zone: string;
  readonly clock: LoggerClock | null;
  readonly locked: boolean;
  readonly onChange: (clock: LoggerClock) => void;
}

/** Which clock the logger was set to. Nothing is picked until somebody does. */
export function ClockChoice({ label, zone, clock, locked, onChange }: ClockChoiceProps) {
  const t = useWords("imports");
  const phone = useBreakpoint() === "phone";
  const [opened, setOpened] = useState<Kind | null>(null);
  const shown = opened ?? clock?.kind ?? null;
  const place = placeOf(zone);
  return (
    <View style={{ gap: 14 }}>
      <ChoiceTiles<Kind>
        label={label}
        value={shown}
        columns={phone ? 1 : 2}
        choices={[
          {
            value: "site",
            label: t("time.clock.site", { place }),
            detail: t(movesWithSummer(zone) ? "time.clock.siteHint" : "time.clock.siteFixedHint"),
          },
          ...(movesWithSummer(zone)
            ? [
                {
                  value: "siteStandard" as const,
                  label: t("time.clock.siteStandard", { place }),
                  detail: t("time.clock.siteStandardHint"),
                },
              ]
            : []),
          { value: "utc", label: t("time.clock.utc"), detail: t("time.clock.utcHint") },
          {
            value: "fixedOffset",
            label: t("time.clock.fixed"),
            detail: t("time.clock.fixedHint"),
          },
          { value: "zone", label: t("time.clock.zone"), detail: t("time.clock.zoneHint") },
        ]}
        onChange={(kind) => {
          if (locked) return;
          if (kind === "site" || kind === "siteStandard" || kind === "utc") {
            setOpened(null);
            onChange({ kind });
          } else {
            setOpened(kind);
          }
        }}
      />
      {shown === "fixedOffset" ? (
        <FixedOffset
          minutes={clock?.kind === "fixedOffset" ? clock.offsetMinutes : null}
          onUse={(offsetMinutes) => {
            setOpened(null);
            onChange({ kind: "fixedOffset", offsetMinutes });
          }}
        />
      ) : null}
      {shown === "zone" ? (
        <SelectField
          label={t("time.clock.zoneLabel")}
          value={clock?.kind === "zone" ? clock.zone : null}
          options={Intl.supportedValuesOf("timeZone").map((name) => ({
            value: name,
            label: name.replace(/_/g, " "),
          }))}
          onChange={(chosen) => {
            setOpened(null);
            onChange({ kind: "zone", zone: chosen });
          }}
        />
      ) : null}
    </View>
  );
}

function FixedOffset(props: { minutes: number | null; onUse: (minutes: number) => void }) {
  const t = useWords("imports");
  const [hours, setHours] = useState<number | null>(
    props.minutes === null ? null : props.minutes / 60,
  );
  const minutes = hours === null ? null : hours * 60;
  const wrong = minutes !== null && (Math.abs(minutes) > 840 || minutes % 15 !== 0);
  return (
    <Row gap={3} align="flex-end" wrap>
      <NumberField
        label={t("time.clock.offsetLabel")}
        hint={t("time.clock.offsetHint")}
        error={wrong ? t("time.clock.offsetError") : null}
        unit="h"
        value={hours}
        onChange={setHours}
      />
      <Button
        label={t("time.clock.use")}
        kind="second"
        offBecause={minutes === null || wrong ? t("time.clock.offsetError") : undefined}
        onPress={() => {
          if (minutes !== null && !wrong) props.onUse(minutes);
        }}
      />
    </Row>
  );
}
