/**
 * Puts text on the clipboard; false where the browser refuses, or has none to give because the page
 * came over plain http from another machine.
 */
export async function copyText(text: string): Promise<boolean> {
  if (!globalThis.navigator?.clipboard) return false;
  try {
    await globalThis.navigator.clipboard.writeText(text);
    return true;
  } catch {
    // Refused by a permission: the caller says so and the text can be selected by hand.
    return false;
  }
}
