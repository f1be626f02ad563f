/** The text of a serial that two writings of it share: `s/n 50 417` and `50417`. */
export function plainSerial(text: string): string {
  return text
    .toUpperCase()
    .replace(/^(S ?\/ ?N|SN|SERIAL)[ :#.]+/, "")
    .replace(/[^\p{L}\p{N}]/gu, "");
}
