/*
 * Back closes the workings. The router writes parameters into the entry that is there, so a copy of it
 * is put on top first. Going back from the copy must change the parameter and nothing else: the router
 * would build the page anew, chart and all.
 */
let isOurs = false;

/**
 * Before the workings open: from here on, Back leads to the page as it is now. Asked twice before the
 * address has changed, as by a double click, it still adds one entry.
 */
export function pushHistoryEntry(): void {
  if (isOurs) return;
  window.history.pushState(window.history.state, "", window.location.href);
  isOurs = true;
}

/** After they were closed otherwise: takes the entry away again. */
export function dropHistoryEntry(): void {
  if (!isOurs) return;
  isOurs = false;
  window.history.back();
}

/** Calls `answer` in place of the router when Back leaves our entry; returns how to stop. */
export function onHistoryBack(answer: () => void): () => void {
  const listen = (event: PopStateEvent) => {
    if (!isOurs) return;
    isOurs = false;
    event.stopImmediatePropagation();
    answer();
  };
  // Capturing listeners of the window come before the router's.
  window.addEventListener("popstate", listen, true);
  return () => window.removeEventListener("popstate", listen, true);
}
