import { useQueryClient } from "@tanstack/react-query";
import { View } from "react-native";
import { approveFill, withdrawFill, type Fill } from "@shared/contracts/corrections";
import { call, useChange } from "@features/api";
import { useWords } from "@features/i18n";
import { Banner, Button, Card, Chip, DefinitionRows, Row, Stack, Text } from "@features/ui";
import type { Format } from "@shared/formats/format";

const chipTones = { proposed: "look", approved: "picked", withdrawn: "line" } as const;

/** One fill: what it stands for, how sure it is, and what may be done about it. */
export function FillCard({ fill, format }: { fill: Fill; format: Format }) {
  const t = useWords("corrections");
  const client = useQueryClient();
  const at = (instant: string) => format.dateTime(Date.parse(instant));
  const changing = useChange({
    send: (contract: typeof approveFill | typeof withdrawFill) =>
      call(contract, { params: { fillId: fill.id } }),
    onDone: () => client.invalidateQueries(),
  });
  const title = t("when.span", { from: at(fill.from), to: at(fill.to) });
  const registers = (["heating", "cooling"] as const).filter((name) => fill[`${name}Kwh`] !== 0);
  const energyOf = (name: "heating" | "cooling") => {
    const kwh = fill[`${name}Kwh`];
    // Printed as every ±: expanded, k = 2.
    return format.figure(kwh, (2 * kwh * fill.uncertaintyPercent) / 100, `${name}Energy`);
  };
  const rows = [
    ...registers.map((name) => ({ label: t(`register.${name}`), value: energyOf(name) })),
    { label: t("fills.filled"), value: format.duration(fill.filledS) },
    { label: t("list.reason"), value: fill.reason },
    ...(fill.days.length > 0
      ? [
          {
            label: t("fills.days"),
            value: fill.days.map((day) => format.day(day)).join(", "),
          },
        ]
      : []),
    {
      label: t("list.proposed"),
      value: t("list.by", { name: fill.createdBy, at: at(fill.createdAt) }),
    },
    ...(fill.approvedBy !== null && fill.approvedAt !== null
      ? [
          {
            label: t("fills.approvedBy"),
            value: t("list.by", { name: fill.approvedBy, at: at(fill.approvedAt) }),
          },
        ]
      : []),
  ];
  return (
    <Card pad={5}>
      <View role="article" aria-label={title}>
        <Stack gap={3}>
          <Row gap={3} justify="space-between" align="flex-start" wrap>
            <Text variant="subhead" level={3}>
              {title}
            </Text>
            <Chip label={t(`fillState.${fill.state}`)} tone={chipTones[fill.state]} />
          </Row>
          <Text>{t(`method.${fill.method}.label`)}</Text>
          <DefinitionRows label={title} rows={rows} />
          {changing.formErrors.length > 0 ? (
            <Banner kind="wrong" live>
              {changing.formErrors.join(" ")}
            </Banner>
          ) : null}
          {fill.can.approve || fill.can.withdraw ? (
            <Row gap={3} wrap>
              {fill.can.approve ? (
                <Button
                  label={t("fills.approve")}
                  said={t("fills.approveSaid", { span: title })}
                  busy={changing.busy}
                  onPress={() => changing.send(approveFill)}
                />
              ) : null}
              {fill.can.withdraw ? (
                <Button
                  kind="second"
                  label={t("withdraw.send")}
                  said={t("fills.withdrawSaid", { span: title })}
                  busy={changing.busy}
                  onPress={() => changing.send(withdrawFill)}
                />
              ) : null}
            </Row>
          ) : null}
        </Stack>
      </View>
    </Card>
  );
}
