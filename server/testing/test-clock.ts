import type { Clock } from "@server/clock";

/** A clock that stands still until a test moves it. */
export class TestClock implements Clock {
  constructor(private at: number = Date.UTC(2026, 2, 2, 9, 0, 0)) {}

  now(): number {
    return this.at;
  }

  date(): Date {
    return new Date(this.at);
  }

  advance(time: { days?: number; hours?: number; minutes?: number; seconds?: number }): void {
    const { days = 0, hours = 0, minutes = 0, seconds = 0 } = time;
    this.at += (((days * 24 + hours) * 60 + minutes) * 60 + seconds) * 1000;
  }
}
