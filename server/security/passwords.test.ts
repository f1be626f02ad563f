import { monitorEventLoopDelay } from "node:perf_hooks";
import { createPasswords } from "./passwords";

const password = "warm return, cold supply";

it("hashes at the real cost without holding up the event loop", async () => {
  const passwords = createPasswords(12);
  try {
    // The first task starts the thread and loads bcrypt.
    const hash = await passwords.hash(password);
    expect(hash).toMatch(/^\$2[aby]\$12\$.{53}$/);
    const delay = monitorEventLoopDelay({ resolution: 5 });
    delay.enable();
    const answers = await Promise.all([
      passwords.matches(password, hash),
      passwords.matches("warm return, cold supplY", hash),
      passwords.matches(password, null),
      passwords.matches(password, hash),
    ]);
    delay.disable();
    expect(answers).toEqual([true, false, false, true]);
    // Four at once on the main thread would hold it for over a second; the median over the run
    // shrugs off a busy machine.
    expect(delay.percentile(50) / 1e6).toBeLessThan(50);
  } finally {
    await passwords.close();
  }
});

it("never takes a password for right that bcrypt would have cut", async () => {
  const passwords = createPasswords(4);
  try {
    const longest = "k".repeat(72);
    const hash = await passwords.hash(longest);
    expect(await passwords.matches(longest, hash)).toBe(true);
    expect(await passwords.matches(`${longest}!`, hash)).toBe(false);
  } finally {
    await passwords.close();
  }
});
