import {
  createContext,
  useCallback,
  useContext,
  useEffect,
  useMemo,
  useRef,
  useState,
  type ReactNode,
} from "react";
import { Pressable, View } from "react-native";
import Svg, { Path } from "react-native-svg";

import { useWords } from "@features/i18n";

import { Text } from "./text";
import { layout, radius, target, useBreakpoint, useTheme, webStyle } from "./theme";

export interface ToastMessage {
  message: string;
  /** Offered for as long as the toast stands. */
  onUndo?: () => void;
}

type Show = (toast: ToastMessage) => void;
const ToastContext = createContext<Show>(() => undefined);

const STANDS_MS = 6000;

export function ToastProvider({ children }: { children: ReactNode }) {
  const [toast, setToast] = useState<ToastMessage | null>(null);
  const timer = useRef<ReturnType<typeof setTimeout> | null>(null);
  const hold = useCallback(() => {
    if (timer.current) clearTimeout(timer.current);
  }, []);
  const show = useCallback<Show>(
    (next) => {
      hold();
      setToast(next);
      timer.current = setTimeout(() => setToast(null), STANDS_MS);
    },
    [hold],
  );
  useEffect(() => hold, [hold]);
  const value = useMemo(() => show, [show]);
  return (
    <ToastContext.Provider value={value}>
      {children}
      <ToastBar toast={toast} onHold={hold} onClose={() => setToast(null)} />
    </ToastContext.Provider>
  );
}

/** `const toast = useToast(); toast({ message: t("saved"), onUndo })`. */
export function useToast(): Show {
  return useContext(ToastContext);
}

function ToastBar(props: { toast: ToastMessage | null; onHold: () => void; onClose: () => void }) {
  const { colour, float } = useTheme();
  const t = useWords("ui");
  const phone = useBreakpoint() === "phone";
  const { toast } = props;
  return (
    <View
      role="status"
      aria-live="polite"
      style={[
        { alignItems: "center", pointerEvents: "box-none" },
        webStyle({
          position: "fixed",
          left: 16,
          right: 16,
          bottom: phone ? layout.phone.bottomBar + 12 : 24,
          zIndex: 90,
        }),
      ]}
    >
      {toast ? (
        <View
          style={[
            {
              flexDirection: "row",
              alignItems: "center",
              gap: 12,
              width: "100%",
              maxWidth: 520,
              minHeight: target.default,
              borderRadius: radius.button,
              paddingHorizontal: 16,
              backgroundColor: colour.ink,
            },
            webStyle({ boxShadow: float }),
          ]}
        >
          <View aria-hidden>
            <Svg width={20} height={20}>
              <Path
                d="M4 10.500l4 4 8-9"
                fill="none"
                stroke={colour.onInk}
                strokeWidth={2.4}
                strokeLinecap="round"
                strokeLinejoin="round"
              />
            </Svg>
          </View>
          <Text variant="bodyWide" tone="onInk" style={{ flex: 1, paddingVertical: 12 }}>
            {toast.message}
          </Text>
          {toast.onUndo ? (
            <Pressable
              role="button"
              onFocus={props.onHold}
              onPress={() => {
                toast.onUndo?.();
                props.onClose();
              }}
              style={{ minHeight: target.default, justifyContent: "center", paddingHorizontal: 8 }}
            >
              <Text
                variant="subhead"
                level="none"
                tone="onInk"
                style={{ textDecorationLine: "underline" }}
              >
                {t("toast.undo")}
              </Text>
            </Pressable>
          ) : null}
        </View>
      ) : null}
    </View>
  );
}
