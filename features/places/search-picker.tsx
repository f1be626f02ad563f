import { useState } from "react";
import { Pressable, View } from "react-native";
import { useWords } from "@features/i18n";
import {
  Icon,
  radius,
  Sheet,
  stroke,
  target,
  Text,
  TextField,
  useTheme,
  VisuallyHidden,
} from "@features/ui";

export interface Pick {
  readonly value: string;
  readonly label: string;
  readonly detail?: string;
  /** Found by these words too. */
  readonly also?: string;
}

const MOST_SHOWN = 40;

/** Accents and case do not matter, and underscores of zone names are spaces to whoever types. */
function plain(text: string): string {
  return text
    .normalize("NFD")
    .replace(/[\u0300-\u036f]/g, "")
    .replace(/_/g, " ")
    .toLowerCase();
}

/** Picks whose words contain every word typed; those that begin with it first. */
export function findPicks(picks: readonly Pick[], typed: string): readonly Pick[] {
  const words = plain(typed).split(/\s+/).filter(Boolean);
  if (words.length === 0) return picks;
  const found = picks.filter((pick) => {
    const text = plain(`${pick.label} ${pick.detail ?? ""} ${pick.also ?? ""}`);
    return words.every((word) => text.includes(word));
  });
  const first = words.join(" ");
  const rank = ({ label }: Pick) => (plain(label).startsWith(first) ? 0 : 1);
  return [...found].sort((a, b) => rank(a) - rank(b));
}

/** A field for one of many known values: it opens a list that is searched by typing. */
export function SearchPicker(props: {
  label: string;
  hint?: string;
  error?: string | null;
  value: string | null;
  picks: readonly Pick[];
  onChange: (value: string) => void;
  /** Words above the list. */
  searchLabel: string;
}) {
  const t = useWords("places");
  const { colour } = useTheme();
  const [open, setOpen] = useState(false);
  const chosen = props.picks.find(({ value }) => value === props.value);
  const shown = chosen?.label ?? props.value ?? t("picker.choose");
  const note = props.error ?? props.hint;
  return (
    <View style={{ gap: 6 }}>
      <Text variant="fieldLabel">{props.label}</Text>
      <Pressable
        role="button"
        aria-label={`${props.label}: ${shown}${note ? `. ${note}` : ""}`}
        aria-expanded={open}
        onPress={() => setOpen(true)}
        style={{
          minHeight: target.default,
          borderWidth: props.error ? 2 : stroke.control,
          borderColor: props.error ? colour.madder : colour.ruleStrong,
          borderRadius: radius.field,
          backgroundColor: colour.sheet,
          paddingHorizontal: 14,
          flexDirection: "row",
          alignItems: "center",
          gap: 8,
        }}
      >
        <Text tone={props.value === null ? "ink3" : "ink"} style={{ flex: 1 }} numberOfLines={1}>
          {shown}
        </Text>
        <Icon name="search" size={18} />
      </Pressable>
      {note ? (
        <Text variant="small" tone={props.error ? "madder" : "ink3"}>
          {note}
        </Text>
      ) : null}
      <Sheet open={open} title={props.label} onClose={() => setOpen(false)}>
        <PickList
          {...props}
          onPick={(value) => {
            setOpen(false);
            props.onChange(value);
          }}
        />
      </Sheet>
    </View>
  );
}

function PickList(props: {
  label: string;
  searchLabel: string;
  value: string | null;
  picks: readonly Pick[];
  onPick: (value: string) => void;
}) {
  const t = useWords("places");
  const { colour } = useTheme();
  const [typed, setTyped] = useState("");
  const found = findPicks(props.picks, typed);
  const shown = found.slice(0, MOST_SHOWN);
  return (
    <View style={{ gap: 12 }}>
      <TextField
        label={props.searchLabel}
        kind="search"
        value={typed}
        onChange={setTyped}
        autoFocus
        autoComplete="off"
      />
      <VisuallyHidden>
        <Text role="status">{t("picker.found", { count: found.length })}</Text>
      </VisuallyHidden>
      <View role="list" aria-label={props.label}>
        {shown.map((pick) => {
          const on = pick.value === props.value;
          return (
            <View key={pick.value} role="listitem">
              <Pressable
                role="button"
                aria-pressed={on}
                onPress={() => props.onPick(pick.value)}
                style={{
                  minHeight: target.default,
                  paddingHorizontal: 12,
                  paddingVertical: 8,
                  flexDirection: "row",
                  alignItems: "center",
                  justifyContent: "space-between",
                  gap: 12,
                  borderRadius: radius.field,
                  backgroundColor: on ? colour.markTint : "transparent",
                }}
              >
                <Text>{pick.label}</Text>
                {pick.detail ? (
                  <Text variant="small" tone="ink2">
                    {pick.detail}
                  </Text>
                ) : null}
              </Pressable>
            </View>
          );
        })}
      </View>
      {found.length === 0 ? <Text tone="ink2">{t("picker.none", { typed })}</Text> : null}
      {found.length > shown.length ? (
        <Text variant="small" tone="ink2">
          {t("picker.more", { count: found.length - shown.length })}
        </Text>
      ) : null}
    </View>
  );
}
