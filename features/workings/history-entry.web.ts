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

let answerBack: (() => void) | null = null;

/*
 * Browsers call the listeners of the window itself in the order they were added, capturing or not.
 * To come before the router's, ours is added when this file is first read: index.ts reads it first.
 */
if (typeof window !== "undefined")
  window.addEventListener("popstate", (event) => {
    if (!isOurs) return;
    isOurs = false;
    if (answerBack === null) return;
    event.stopImmediatePropagation();
    answerBack();
  });

/** Calls `answer` in place of the router when Back leaves our entry; returns how to stop. */
export function onHistoryBack(answer: () => void): () => void {
  answerBack = answer;
  return () => {
    if (answerBack === answer) answerBack = null;
  };
}
