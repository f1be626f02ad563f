import { Linking } from "react-native";

/** Opens a download in the device's browser, which asks where to keep it. */
export function saveFile(address: string): void {
  void Linking.openURL(address);
}
