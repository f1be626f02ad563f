import Head from "expo-router/head";
import { useState, type ReactNode } from "react";
import { useWindowDimensions, View } from "react-native";

import { usePreferences, useWords } from "@features/i18n";
import { BrandMark, Row, Segments, Text, useBreakpoint, useTheme, webStyle } from "@features/ui";

import { EntryPipes } from "./entry-pipes";
import { pipesRoom } from "./pipes-room";

/** Frame of the pages before anybody is signed in: the form inside a heating and a cooling loop. */
export function EntryFrame(props: {
  /** Browser title, and the h1 unless the brand is. */
  title: string;
  /** Sign-in: the name is the h1, and it stands big. */
  isFront?: boolean;
  lead?: string;
  children: ReactNode;
}) {
  const { colour } = useTheme();
  const wide = useBreakpoint() === "wide";
  const screen = useWindowDimensions();
  const [drawn, setDrawn] = useState({ width: 0, height: 0 });
  const room = pipesRoom(wide, screen);
  return (
    <View
      onLayout={({ nativeEvent: { layout } }) =>
        setDrawn({ width: layout.width, height: layout.height })
      }
      style={[{ flexGrow: 1, backgroundColor: colour.pad }, webStyle({ minHeight: "100dvh" })]}
    >
      <Head>
        <title>{`${props.title} · Loopwright`}</title>
      </Head>
      {drawn.width > 0 ? <EntryPipes {...drawn} room={room} wide={wide} /> : null}
      <View
        role="main"
        style={{
          flexGrow: 1,
          flexDirection: wide ? "row" : "column",
          justifyContent: wide ? "space-between" : "flex-start",
          alignItems: wide ? "center" : "stretch",
          alignSelf: "center",
          width: "100%",
          maxWidth: wide ? undefined : 560,
          ...room.padding,
          gap: wide ? 40 : 28,
        }}
      >
        {wide ? <WideBrand isHeading={props.isFront} lift={room.brandLift} /> : null}
        {wide ? null : <PhoneBrand isFront={props.isFront} />}
        <View style={wide ? { width: 376, flexShrink: 0, gap: 16 } : { gap: 16 }}>
          {props.isFront ? null : (
            <Text variant="title" level={1}>
              {props.title}
            </Text>
          )}
          {props.lead ? <Text tone="ink2">{props.lead}</Text> : null}
          {props.children}
          <LanguageSwitch />
        </View>
      </View>
    </View>
  );
}

function PhoneBrand({ isFront }: { isFront?: boolean }) {
  const t = useWords("people");
  if (!isFront) {
    return (
      <Row gap={2}>
        <BrandMark size={32} />
        <Text variant="wordmark">Loopwright</Text>
      </Row>
    );
  }
  return (
    <View>
      <BrandMark size={50} />
      <Text variant="wordmarkPhone" level={1} style={{ marginTop: 14, marginBottom: 6 }}>
        Loopwright
      </Text>
      <Text tone="ink2">{t("brand.short")}</Text>
    </View>
  );
}

function WideBrand({ isHeading, lift }: { isHeading?: boolean; lift: number }) {
  const t = useWords("people");
  return (
    <View style={{ flexShrink: 1, maxWidth: 560, marginBottom: lift }}>
      <View style={{ flexDirection: "row", alignItems: "center", gap: 18 }}>
        <BrandMark size={64} />
        <Text variant="wordmarkWide" level={isHeading ? 1 : "none"}>
          Loopwright
        </Text>
      </View>
      <Text variant="lead" tone="ink2" style={{ marginTop: 22, maxWidth: 470 }}>
        {t("brand.long")}
      </Text>
    </View>
  );
}

/** Nobody is known yet, so the language is this device's. */
function LanguageSwitch() {
  const t = useWords("people");
  const { language, chooseLanguage } = usePreferences();
  return (
    <View style={{ marginTop: 8 }}>
      <Segments
        label={t("settings.language")}
        size="dense"
        value={language}
        options={[
          { value: "en", label: "English" },
          { value: "de", label: "Deutsch" },
        ]}
        onChange={chooseLanguage}
      />
    </View>
  );
}
