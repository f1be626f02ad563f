/** Drafts live as long as the tab: natively nothing outlives the screen but memory. */
const memory = new Map<string, string>();

export const draftStore = {
  read: (key: string): string | null => memory.get(key) ?? null,
  write: (key: string, value: string): void => void memory.set(key, value),
  clear: (key: string): void => void memory.delete(key),
};
