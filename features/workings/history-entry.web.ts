/*
 * Back closes the workings. The router writes parameters into the entry that is there, so a copy of it
 * is put on top first. Going back from the copy must change the parameter and nothing else: the router
 * would build the page anew, chart and all.
 */
let ours = 0;

/** Before the workings open: from here on, Back leads to the page as it is now. */
export function pushHistoryEntry(): void {
  window.history.pushState(window.history.state, "", window.location.href);
  ours++;
}

/** After they were closed otherwise: takes the entry away again. */
export function dropHistoryEntry(): void {
  if (ours === 0) return;
  ours--;
  window.history.back();
}

/** Calls `answer` in place of the router when Back leaves our entry; returns how to stop. */
export function onHistoryBack(answer: () => void): () => void {
  const listen = (event: PopStateEvent) => {
    if (ours === 0) return;
    ours--;
    event.stopImmediatePropagation();
    answer();
  };
  // Capturing listeners of the window come before the router's.
  window.addEventListener("popstate", listen, true);
  return () => window.removeEventListener("popstate", listen, true);
}
