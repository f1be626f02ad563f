import { Linking } from "react-native";

/** Opens a download in the device's browser, which asks where to keep it. */
export function saveAddress(address: string): void {
  void Linking.openURL(address);
}
