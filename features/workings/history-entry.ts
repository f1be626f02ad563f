/** Only a browser has a Back button to answer. */
export function pushHistoryEntry(): void {}

export function dropHistoryEntry(): void {}

export function onHistoryBack(_answer: () => void): () => void {
  return () => undefined;
}
