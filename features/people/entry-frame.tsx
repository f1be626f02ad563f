import Head from "expo-router/head";
import { useState, type ReactNode } from "react";
import { View } from "react-native";

import { usePreferences, useWords } from "@features/i18n";
import { BrandMark, Segments, Text, useBreakpoint, useTheme, webStyle } from "@features/ui";

import { EntryPipes } from "./entry-pipes";

/** Frame of the pages before anybody is signed in: the form inside a heating and a cooling loop. */
export function EntryFrame(props: {
  /** Browser title. */
  title: string;
  /** The h1 above the form; on the sign-in page the name is the h1. */
  heading?: string;
  lead?: string;
  children: ReactNode;
}) {
  const { colour } = useTheme();
  const wide = useBreakpoint() === "wide";
  const [box, setBox] = useState({ width: 0, height: 0 });
  return (
    <View
      onLayout={(event) => {
        const { width, height } = event.nativeEvent.layout;
        setBox({ width, height });
      }}
      style={[{ flexGrow: 1, backgroundColor: colour.pad }, webStyle({ minHeight: "100dvh" })]}
    >
      <Head>
        <title>{`${props.title} · Loopwright`}</title>
      </Head>
      {box.width > 0 ? <EntryPipes {...box} wide={wide} /> : null}
      <View
        role="main"
        style={{
          flexGrow: 1,
          flexDirection: wide ? "row" : "column",
          justifyContent: wide ? "space-between" : "flex-start",
          alignItems: wide ? "center" : "stretch",
          width: "100%",
          maxWidth: wide ? undefined : 560,
          alignSelf: "center",
          paddingLeft: wide ? 120 : 58,
          paddingRight: wide ? 256 : 58,
          paddingTop: wide ? 200 : 84,
          paddingBottom: wide ? 200 : 76,
          gap: wide ? 48 : 28,
        }}
      >
        <Brand wide={wide} isHeading={props.heading === undefined} />
        <View style={{ width: wide ? 376 : "100%", gap: 16 }}>
          {props.heading ? (
            <Text variant="title" level={1}>
              {props.heading}
            </Text>
          ) : null}
          {props.lead ? <Text tone="ink2">{props.lead}</Text> : null}
          {props.children}
          <LanguageSwitch />
        </View>
      </View>
    </View>
  );
}

function Brand({ wide, isHeading }: { wide: boolean; isHeading: boolean }) {
  const t = useWords("people");
  const name = (
    <Text variant={wide ? "wordmarkWide" : "wordmarkPhone"} level={isHeading ? 1 : "none"}>
      Loopwright
    </Text>
  );
  if (!wide) {
    return (
      <View>
        <BrandMark size={50} />
        <View style={{ marginTop: 14 }}>{name}</View>
        {isHeading ? (
          <View style={{ marginTop: 6 }}>
            <Text tone="ink2">{t("entry.claimShort")}</Text>
          </View>
        ) : null}
      </View>
    );
  }
  return (
    <View style={{ flexShrink: 1, maxWidth: 560 }}>
      <View style={{ flexDirection: "row", alignItems: "center", gap: 18 }}>
        <BrandMark size={64} />
        {name}
      </View>
      <View style={{ marginTop: 22, maxWidth: 470 }}>
        <Text variant="lead" tone="ink2">
          {t("entry.claim")}
        </Text>
      </View>
    </View>
  );
}

function LanguageSwitch() {
  const t = useWords("people");
  const { language, chooseLanguage } = usePreferences();
  return (
    <View style={{ marginTop: 8 }}>
      <Segments
        label={t("settings.language")}
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
