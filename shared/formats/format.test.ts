import { makeFormat } from "./format";

describe("dates and durations on screen", () => {
  const london = makeFormat("en", "si", "Europe/London");

  it("stand in the site's zone", () => {
    const at = Date.parse("2026-05-14T23:30:00Z");
    expect(london.dateTime(at)).toBe("Fri 15 May, 00:30");
    expect(makeFormat("de", "si", "Europe/Berlin").dateTime(at)).toBe("Fr. 15. Mai, 01:30");
  });

  it("keep a calendar day that day, whatever the zone", () => {
    expect(makeFormat("en", "si", "Pacific/Auckland").day("2026-05-14")).toBe("Thu 14 May");
    expect(makeFormat("en", "si", "America/Los_Angeles").day("2026-05-14")).toBe("Thu 14 May");
  });

  // Midnight of the year's first day comes to London five hours before New York.
  it("carry the year where it is not this year at the site", () => {
    const at = Date.parse("2026-01-01T02:00:00Z");
    const inYear = (zone: string, today: string) => makeFormat("en", "si", zone, today);
    expect(inYear("Europe/London", "2026-03-01").dateTime(at)).toBe("Thu 1 Jan, 02:00");
    expect(inYear("America/New_York", "2026-03-01").dateTime(at)).toBe("Wed 31 Dec 2025, 21:00");
    expect(inYear("Europe/London", "2027-03-01").day("2026-05-14")).toBe("Thu 14 May 2026");
    expect(makeFormat("de", "si", "Europe/Berlin", "2027-03-01").day("2026-05-14")).toBe(
      "Do. 14. Mai 2026",
    );
    // A style chosen by hand stays as it is.
    expect(inYear("UTC", "2027-03-01").day("2026-05-14", "weekdayShort")).toBe("Thu");
  });

  it("write durations in the largest unit that still tells something", () => {
    expect(london.duration(20)).toBe("20\u00A0s");
    expect(london.duration(12_000)).toBe("3\u00A0h 20\u00A0min");
    expect(london.duration(5 * 86_400)).toBe("5\u00A0d");
  });

  // 1 kWh = 3.412142 kBtu (International Table Btu, NIST SP 811, appendix B.8).
  it("convert for the account and scale the ± without the offset", () => {
    const inchPound = makeFormat("en", "inchPound", "UTC");
    expect(inchPound.figure(1000, 30, "heatingEnergy")).toBe("3,410 ± 100\u00A0kBtu");
    expect(inchPound.figure(20, 0.5, "temperature")).toBe("68.00 ± 0.90\u00A0°F");
  });
});
