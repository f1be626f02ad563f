import { DAY_MS, HOUR_MS } from "@shared/domain/time/interval";
import { noise, seededRandom } from "./seeded-random";

const STEP_MS = HOUR_MS;

/**
 * Invented outdoor temperature of a mild coastal town, hourly and straight between hours: a yearly
 * and a daily swing, and weather that wanders over days.
 */
export class SiteWeather {
  private readonly hourlyC: Float64Array;

  constructor(
    private readonly fromMs: number,
    toMs: number,
    seed: number,
  ) {
    const random = seededRandom(seed);
    this.hourlyC = new Float64Array(Math.ceil((toMs - fromMs) / STEP_MS) + 2);
    let wanderC = 0;
    for (let hour = 0; hour < this.hourlyC.length; hour++) {
      const ms = fromMs + hour * STEP_MS;
      const start = Date.UTC(new Date(ms).getUTCFullYear(), 0, 1);
      const yearDay = (ms - start) / DAY_MS;
      const dayHour = (ms % DAY_MS) / HOUR_MS;
      wanderC = 0.985 * wanderC + 0.45 * noise(random);
      this.hourlyC[hour] =
        11 +
        6.5 * Math.cos((2 * Math.PI * (yearDay - 205)) / 365.25) +
        3.2 * Math.cos((2 * Math.PI * (dayHour - 14.5)) / 24) +
        wanderC;
    }
  }

  outdoorC(ms: number): number {
    const place = Math.max(0, (ms - this.fromMs) / STEP_MS);
    const hour = Math.min(Math.floor(place), this.hourlyC.length - 2);
    const before = this.hourlyC[hour] ?? 0;
    const after = this.hourlyC[hour + 1] ?? before;
    return before + (after - before) * (place - hour);
  }
}
