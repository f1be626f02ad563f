import type { ReactNode } from "react";
import { Modal, View } from "react-native";

export interface OverlayProps {
  /** Id of the heading that names it. */
  labelledBy: string;
  role: "dialog" | "alertdialog";
  onClose: () => void;
  /** Space left free and in reach at the foot of the screen, px: the phone bar. */
  foot?: number;
  children: ReactNode;
}

export function Overlay({ onClose, children }: OverlayProps) {
  return (
    <Modal transparent visible onRequestClose={onClose}>
      <View style={{ flex: 1 }}>{children}</View>
    </Modal>
  );
}
