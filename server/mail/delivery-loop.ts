import type { Services } from "@server/services";
import { deliverOutbox } from "./deliver-outbox";
import { smtpSender } from "./transport";

const everyMs = 1_000;

/**
 * Delivers the outbox until stopped. Looking is one indexed query a second, which spares a signal
 * between the servers that may share the database.
 */
export function startDeliveryLoop(services: Services): { stop(): Promise<void> } {
  const sender = smtpSender(services.config);
  let stopped = false;
  let timer: NodeJS.Timeout | undefined;
  let wake: (() => void) | undefined;
  const pause = () =>
    new Promise<void>((resolve) => {
      wake = resolve;
      timer = setTimeout(resolve, everyMs);
    });
  const run = async () => {
    while (!stopped) {
      try {
        await deliverOutbox(services, sender.send);
      } catch (error) {
        // The database may be away for a while; the letters wait in it.
        services.log.error({ err: error }, "the outbox could not be read");
      }
      if (!stopped) await pause();
    }
  };
  const running = run();
  return {
    async stop() {
      stopped = true;
      clearTimeout(timer);
      wake?.();
      await running;
      sender.close();
    },
  };
}
