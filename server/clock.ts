/** The server's only source of "now", in UTC milliseconds: tests set it, so expiry is testable. */
export interface Clock {
  now(): number;
  date(): Date;
}

export const systemClock: Clock = {
  now: () => Date.now(),
  date: () => new Date(),
};
