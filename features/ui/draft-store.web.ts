/**
 * Drafts live in the tab's session storage, so a reload or a wrong Back loses nothing and another
 * tab sees nothing. Where the browser refuses storage, typing still works; only the draft is lost.
 */
function attempt<Result>(work: () => Result, otherwise: Result): Result {
  try {
    return work();
  } catch (error) {
    if (error instanceof DOMException) return otherwise;
    throw error;
  }
}

export const draftStore = {
  read: (key: string): string | null => attempt(() => sessionStorage.getItem(key), null),
  write: (key: string, value: string): void =>
    attempt(() => sessionStorage.setItem(key, value), undefined),
  clear: (key: string): void => attempt(() => sessionStorage.removeItem(key), undefined),
};
