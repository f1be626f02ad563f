/** Ties an open figure to the workings beside the page; only a wide screen has both side by side. */
export function MarkLine() {
  return null;
}
