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
