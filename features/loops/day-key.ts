import { addDays } from "@shared/domain/time/local-calendar";
import type { WorkingsKey } from "@features/workings/workings-key";

import type { RegisterName } from "./register-words";

/** A day's energy within a longer range; a loop with one register needs not name it. */
export function dayKey(date: string, register: RegisterName | undefined): WorkingsKey {
  return {
    figure: "energy",
    ...(register === undefined ? {} : { register }),
    from: date,
    to: addDays(date, 1),
  };
}
