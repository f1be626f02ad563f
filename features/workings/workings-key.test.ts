import { readWorkingsKey, writeWorkingsKey, type WorkingsKey } from "./workings-key";

describe("the address of a figure's workings", () => {
  const keys: [string, WorkingsKey][] = [
    ["energy", { figure: "energy" }],
    ["energy~heating", { figure: "energy", register: "heating" }],
    ["nightBase~p7", { figure: "nightBase", pointId: "7" }],
    [
      "power~cooling~p7~2026-05-14T14:30:00Z~2026-05-14T15:00:00Z",
      {
        figure: "power",
        register: "cooling",
        pointId: "7",
        from: "2026-05-14T14:30:00Z",
        to: "2026-05-14T15:00:00Z",
      },
    ],
    ["energy~2026-05-14~2026-05-15", { figure: "energy", from: "2026-05-14", to: "2026-05-15" }],
  ];
  it.each(keys)("%s says what it means, both ways", (text, key) => {
    expect(writeWorkingsKey(key)).toBe(text);
    expect(readWorkingsKey(text)).toEqual(key);
  });

  it("opens nothing where it names no figure", () => {
    expect(readWorkingsKey(undefined)).toBeNull();
    expect(readWorkingsKey("weather")).toBeNull();
  });

  it("leaves out half a range and a point that is none", () => {
    expect(readWorkingsKey("energy~p0~2026-05-14")).toEqual({ figure: "energy" });
  });
});
