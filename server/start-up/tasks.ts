import { seedDemo } from "@server/demo/seed-demo";
import { startDeliveryLoop } from "@server/mail/delivery-loop";
import { startMailFake } from "@server/mail/mail-fake";
import type { Services } from "@server/services";
import { ensureDemoPeople } from "./demo-people";

/** Something to do once after the migrations and before anybody is served. Must be repeatable. */
export interface StartUpTask {
  readonly name: string;
  run(services: Services): Promise<void>;
}

/** Something that runs beside the requests until the server stops. */
export interface BackgroundService {
  readonly name: string;
  start(services: Services): Promise<{ stop(): Promise<void> } | null>;
}

/** Run in this order. The demo's tasks ask `config.demo`, which is never on in production. */
export const startUpTasks: readonly StartUpTask[] = [
  {
    name: "abandoned uploads",
    run: ({ files, clock }) => files.removeAbandoned(clock.now()),
  },
  {
    name: "demo people",
    async run(services) {
      if (services.config.demo) await ensureDemoPeople(services);
    },
  },
];

/** Started in this order, after the tasks; stopped in the reverse one. */
export const backgroundServices: readonly BackgroundService[] = [
  {
    name: "mail fake",
    async start({ config, clock }) {
      const { mailFakePort: port, dataDir } = config;
      return port === null ? null : startMailFake({ port, dataDir, clock });
    },
  },
  { name: "mail delivery", start: async (services) => startDeliveryLoop(services) },
  {
    name: "jobs",
    async start({ jobs }) {
      jobs.start();
      return { stop: () => jobs.stop() };
    },
  },
  {
    // After the jobs, which import its logs, and before anybody is served: it is whole from the start.
    name: "demo site",
    async start(services) {
      if (!services.config.demo) return null;
      await seedDemo(services, await ensureDemoPeople(services));
      return null;
    },
  },
];
