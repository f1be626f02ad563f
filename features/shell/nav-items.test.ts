import { destinationOf, navFor } from "./nav-items";

describe("navigation", () => {
  it("knows which destination a page belongs to", () => {
    expect(destinationOf("/")).toBe("today");
    expect(destinationOf("/loops/12")).toBe("sites");
    expect(destinationOf("/sites/3/edit")).toBe("sites");
    expect(destinationOf("/logs/new")).toBe("logs");
    expect(destinationOf("/compare/meters/7")).toBe("compare");
    expect(destinationOf("/settings/members")).toBe("settings");
    expect(destinationOf("/sitesmap")).toBeNull();
  });

  it("lists every destination of the rail on the phone too, on the bar or in More", () => {
    for (const role of [
      "administrator",
      "surveyor",
      "engineer",
      "billingClerk",
      "tenantContact",
    ] as const) {
      const { bar, more, rail } = navFor(role);
      expect([...bar, ...more].sort()).toEqual([...rail].sort());
    }
  });

  it("leads surveyors to Compare, where they may work one out", () => {
    expect(navFor("surveyor").more).toContain("compare");
    expect(navFor("billingClerk").rail).not.toContain("compare");
  });

  it("shows a tenant contact nothing of the sites", () => {
    expect(navFor("tenantContact").rail).toEqual(["settings"]);
  });
});
