/** Lets what waits in the event loop run, between the parts of a long calculation. */
export function breathe(): Promise<void> {
  return new Promise((resolve) => {
    setImmediate(resolve);
  });
}
