import { useQuery } from "@tanstack/react-query";
import type { Point } from "@shared/contracts/places";
import { useWords, type Format } from "@features/i18n";
import { Card, ListRow, Text } from "@features/ui";
import { placesQueries } from "./places-queries";

/** Earlier pipes of a point. Nothing is shown while there has been only one. */
export function BoreHistory({ point, format }: { point: Point; format: Format }) {
  const t = useWords("places");
  const { data } = useQuery(placesQueries.bores(point.id));
  if (!data || data.items.length < 2) return null;
  return (
    <Card pad={4} label={t("pipe.history")}>
      <Text variant="heading" level={2}>
        {t("pipe.history")}
      </Text>
      {data.items.map(({ validFrom, validTo, bore }, index) => (
        <ListRow
          key={validFrom}
          first={index === 0}
          title={bore.label}
          detail={t(validTo === null ? "pipe.since" : "pipe.between", {
            from: format.dateTime(Date.parse(validFrom)),
            to: validTo === null ? "" : format.dateTime(Date.parse(validTo)),
          })}
          trail={format.withUnit(bore.insideDiameterMm, "pipeSize", 2)}
        />
      ))}
    </Card>
  );
}
