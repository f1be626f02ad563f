import type { ReactNode } from "react";
import { View } from "react-native";
import Svg, { Path } from "react-native-svg";

import { useFormat, useProblemWords, useWords } from "@features/i18n";
import type { Problem } from "@shared/contracts/contract";

import { Button } from "./button";
import { Card } from "./card";
import { Icon } from "./icon";
import { Mark } from "./mark";
import { Row } from "./stack";
import { Text } from "./text";
import { radius, useTheme } from "./theme";

/** Dashed loop, what is missing, one way on. */
export function EmptyState(props: {
  title: string;
  detail?: string;
  action?: ReactNode;
  level?: 2 | 3;
}) {
  const { colour } = useTheme();
  return (
    <Card pad={5}>
      <View aria-hidden style={{ alignItems: "center", marginBottom: 12 }}>
        <Svg width={300} height={110} style={{ maxWidth: "100%" }} viewBox="0 0 300 110">
          <Path
            d="M12 55V38a26 26 0 0 1 26 -26H262a26 26 0 0 1 26 26V72a26 26 0 0 1 -26 26H38a26 26 0 0 1 -26 -26z"
            fill="none"
            stroke={colour.ruleStrong}
            strokeWidth={2.4}
            strokeDasharray="3 6"
            strokeLinecap="round"
          />
          <Path
            d="M133 88h12v10h-12zM155 88h12v10h-12z"
            fill={colour.sheet}
            stroke={colour.ruleStrong}
            strokeWidth={2}
          />
        </Svg>
      </View>
      <Text variant="heading" level={props.level ?? 2}>
        {props.title}
      </Text>
      {props.detail ? <Text tone="ink2">{props.detail}</Text> : null}
      {props.action ? <View style={{ marginTop: 20 }}>{props.action}</View> : null}
    </Card>
  );
}

export type BlockShape = { width: number | `${number}%`; height: number };

const usualBlocks: readonly BlockShape[] = [
  { width: 200, height: 26 },
  { width: "100%", height: 120 },
  { width: "60%", height: 18 },
];

/** Still blocks in the final layout; nothing shimmers. */
export function LoadingBlocks({
  blocks = usualBlocks,
  label,
}: {
  blocks?: readonly BlockShape[];
  label?: string;
}) {
  const { colour } = useTheme();
  const t = useWords("ui");
  return (
    <View role="status" aria-label={label ?? t("state.loading")} aria-busy style={{ gap: 14 }}>
      {blocks.map((block, index) => (
        <View
          key={index}
          aria-hidden
          style={{
            width: block.width,
            maxWidth: "100%",
            height: block.height,
            borderRadius: block.height > 60 ? radius.button : radius.small,
            backgroundColor: colour.slateTint,
          }}
        />
      ))}
    </View>
  );
}

export interface ErrorStateProps {
  /** What happened, in the screen's own words; the problem's title otherwise. */
  title?: string;
  problem?: Problem | null;
  /** What was seen: lines of a file, a value. Set in mono. */
  seen?: string;
  /** One or two ways on. */
  actions?: ReactNode;
  onRetry?: () => void;
}

/** What happened, what was seen, what to do, two ways on. */
export function ErrorState({ title, problem, seen, actions, onRetry }: ErrorStateProps) {
  const { colour } = useTheme();
  const t = useWords("ui");
  const inWords = useProblemWords();
  const said = problem ? inWords(problem) : null;
  return (
    <Card pad={5}>
      <View role="alert">
        <Row gap={3} align="flex-start">
          <View style={{ marginTop: 1 }}>
            <Mark kind="wrong" size={24} silent />
          </View>
          <View style={{ flex: 1, minWidth: 0, gap: 4 }}>
            <Text variant="heading">{title ?? said?.title ?? t("state.errorTitle")}</Text>
            <Text tone="ink2">{said?.detail ?? t("state.errorDetail")}</Text>
            {said?.remedy ? <Text tone="ink2">{said.remedy}</Text> : null}
          </View>
        </Row>
        {seen ? (
          <View
            style={{
              backgroundColor: colour.well,
              borderRadius: radius.field,
              padding: 12,
              marginTop: 14,
            }}
          >
            <Text variant="asReadS">{seen}</Text>
          </View>
        ) : null}
      </View>
      {actions || onRetry ? (
        <Row gap={3} wrap style={{ marginTop: 20 }}>
          {actions}
          {onRetry ? (
            <Button
              kind={actions ? "second" : "primary"}
              label={t("state.tryAgain")}
              onPress={onRetry}
            />
          ) : null}
        </Row>
      ) : null}
    </Card>
  );
}

/** Not allowed: says who can help, and never pretends the thing does not exist. */
export function DeniedState({ detail, action }: { detail?: string; action?: ReactNode }) {
  const t = useWords("ui");
  return (
    <Card pad={5}>
      <Row gap={3} align="flex-start">
        <Icon name="key" size={26} />
        <View style={{ flex: 1, minWidth: 0, gap: 4 }}>
          <Text variant="heading">{t("state.deniedTitle")}</Text>
          <Text tone="ink2">{detail ?? t("state.deniedDetail")}</Text>
        </View>
      </Row>
      {action ? <View style={{ marginTop: 20 }}>{action}</View> : null}
    </Card>
  );
}

/** Since when, what works, what waits. */
export function OfflineState(props: {
  sinceMs: number | null;
  detail?: string;
  onRetry: () => void;
}) {
  const t = useWords("ui");
  const format = useFormat();
  return (
    <Card pad={5}>
      <View role="status">
        <Row gap={3} align="flex-start">
          <Icon name="offline" size={28} />
          <View style={{ flex: 1, minWidth: 0, gap: 4 }}>
            <Text variant="heading">
              {props.sinceMs === null
                ? t("state.offlineTitle")
                : t("state.offlineSince", { time: format.time(props.sinceMs) })}
            </Text>
            <Text tone="ink2">{props.detail ?? t("state.offlineDetail")}</Text>
          </View>
        </Row>
      </View>
      <View style={{ marginTop: 20 }}>
        <Button kind="second" label={t("state.tryNow")} onPress={props.onRetry} />
      </View>
    </Card>
  );
}
