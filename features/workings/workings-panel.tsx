import { useQuery } from "@tanstack/react-query";
import { useEffect, useRef } from "react";
import { View } from "react-native";

import { FailedAnswer, saveFile } from "@features/api";
import { useFormat, useWords } from "@features/i18n";
import {
  Button,
  layout,
  LoadingBlocks,
  Menu,
  Row,
  Sheet,
  squaredPaper,
  stroke,
  Text,
  useBreakpoint,
  useTheme,
  webStyle,
} from "@features/ui";

import { focusInside, focusedNow, type Focused } from "./panel-focus";
import { WorkingsBody } from "./workings-body";
import { workingsAddresses, workingsQueries, type AskedFigure } from "./workings-queries";

interface PanelProps {
  asked: AskedFigure;
  onClose: () => void;
}

/**
 * Workings over the page: a full-height sheet on a phone, a drawer at the right elsewhere. The focus
 * goes in and comes back to the figure.
 */
export function WorkingsSheet({ asked, onClose }: PanelProps) {
  const t = useWords("workings");
  const phone = useBreakpoint() === "phone";
  return (
    <Sheet
      kind="side"
      ground="squared"
      open
      title={t("title")}
      closeLabel={t("close")}
      actions={<SendMenu asked={asked} />}
      onClose={onClose}
    >
      <Answer asked={asked} large={phone} />
    </Sheet>
  );
}

/** Workings beside the page, in place of the inspector; below 1120 px they lie over it. */
export function WorkingsAside(props: PanelProps) {
  const wide = useBreakpoint() === "wide";
  return wide ? <Drawer {...props} /> : <WorkingsSheet {...props} />;
}

function Drawer({ asked, onClose }: PanelProps) {
  const t = useWords("workings");
  const { colour } = useTheme();
  const box = useRef<View>(null);
  useEffect(() => {
    const before: Focused = focusedNow();
    focusInside(box.current);
    return () => before?.focus();
  }, []);
  return (
    <View
      ref={box}
      role="complementary"
      aria-label={t("title")}
      tabIndex={-1}
      {...{
        dataSet: { programmaticFocus: "true" },
        onKeyDown: (event: { key?: string; stopPropagation: () => void }) => {
          if (event.key !== "Escape") return;
          event.stopPropagation();
          onClose();
        },
      }}
      style={[
        {
          width: layout.wide.workings,
          flexShrink: 0,
          alignSelf: "flex-start",
          backgroundColor: colour.sheet,
          borderLeftWidth: stroke.run,
          borderLeftColor: colour.mark,
          paddingVertical: 18,
          paddingHorizontal: 24,
        },
        squaredPaper(colour),
        // As tall as the window, so that figure and workings stay in sight together.
        webStyle({
          outline: "none",
          position: "sticky",
          top: 0,
          height: "100dvh",
          overflowY: "auto",
        }),
      ]}
    >
      <Row justify="space-between" style={{ zIndex: 20 }}>
        <Text variant="heading" level={2}>
          {t("title")}
        </Text>
        <Row gap={1}>
          <SendMenu asked={asked} />
          <Button kind="quiet" icon="close" iconOnly label={t("close")} onPress={onClose} />
        </Row>
      </Row>
      <Answer asked={asked} large={false} />
    </View>
  );
}

function SendMenu({ asked }: { asked: AskedFigure }) {
  const t = useWords("workings");
  const { language } = useFormat();
  const file = (key: "pdf" | "csv", address: string) => ({
    key,
    label: t(`send.${key}`),
    icon: "download" as const,
    onPress: () => saveFile(address),
  });
  return (
    <Menu
      label={t("send.label")}
      icon="share"
      iconOnly
      kind="quiet"
      items={[
        file("pdf", workingsAddresses.pdf(asked, language)),
        file("csv", workingsAddresses.csv(asked)),
      ]}
    />
  );
}

function Answer({ asked, large }: { asked: AskedFigure; large: boolean }) {
  const answer = useQuery(workingsQueries.of(asked));
  if (answer.data) return <WorkingsBody model={answer.data} large={large} />;
  if (answer.error)
    return <FailedAnswer error={answer.error} onRetry={() => void answer.refetch()} />;
  return (
    <LoadingBlocks
      blocks={[
        { width: "70%", height: 40 },
        { width: "90%", height: 32 },
        { width: "100%", height: 170 },
        { width: "100%", height: 330 },
      ]}
    />
  );
}
