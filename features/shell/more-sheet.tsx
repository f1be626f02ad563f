import { router } from "expo-router";
import { View } from "react-native";

import type { Session } from "@shared/contracts/people";
import { useOfflineSince } from "@features/api";
import { usePreferences, useWords } from "@features/i18n";
import {
  Button,
  Divider,
  Icon,
  layout,
  ListRow,
  Row,
  Segments,
  Sheet,
  SwitchField,
  Text,
  useTheme,
  useThemeChoice,
} from "@features/ui";

import { navItems, type Destination } from "./nav-items";
import { useSignOut } from "./use-sign-out";

interface MoreSheetProps {
  session: Session;
  items: readonly Destination[];
  open: boolean;
  onClose: () => void;
}

/** The rest of the destinations, and what belongs to the person: theme, language, sign-out. */
export function MoreSheet({ session, items, open, onClose }: MoreSheetProps) {
  const t = useWords("shell");
  const theme = useTheme();
  const { choose } = useThemeChoice();
  const { language, chooseLanguage } = usePreferences();
  const signOut = useSignOut();
  const offline = useOfflineSince() !== null;
  return (
    <Sheet
      open={open}
      onClose={onClose}
      title={t("nav.more")}
      foot={layout.phone.bottomBar}
      ground="pad"
    >
      {items.map((key) => (
        <ListRow
          key={key}
          icon={navItems[key].icon}
          title={t(`nav.${key}`)}
          detail={t(`more.${key}`)}
          onPress={() => {
            onClose();
            router.push(navItems[key].href);
          }}
        />
      ))}
      <Divider />
      <SwitchField
        label={t("theme.plantRoom")}
        detail={t("theme.plantRoomDetail")}
        on={theme.name === "plantRoom"}
        onChange={(on) => choose(on ? "plantRoom" : "light")}
      />
      <Divider />
      <Row justify="space-between" style={{ paddingVertical: 10 }}>
        <Text variant="subhead" level="none">
          {t("language.label")}
        </Text>
        <Segments
          label={t("language.label")}
          value={language}
          options={[
            { value: "en", label: "English" },
            { value: "de", label: "Deutsch" },
          ]}
          onChange={chooseLanguage}
        />
      </Row>
      <Divider />
      <Row justify="space-between" style={{ marginTop: 12 }}>
        <View style={{ flexShrink: 1 }}>
          <Text variant="subhead" level="none">
            {session.account.name}
          </Text>
          <Text variant="small" tone="ink2">
            {t(`role.${session.role}`)}
          </Text>
        </View>
        <Button
          kind="second"
          icon="signOut"
          label={t("signOut")}
          busy={signOut.isPending}
          onPress={() => signOut.mutate()}
        />
      </Row>
      {offline ? (
        <Row gap={2} style={{ marginTop: 10 }}>
          <Icon name="offline" size={18} tone="ink2" />
          <Text variant="small" tone="ink2">
            {t("offline.short")}
          </Text>
        </Row>
      ) : null}
    </Sheet>
  );
}
