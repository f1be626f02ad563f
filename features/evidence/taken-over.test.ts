import type { Instrument } from "@shared/contracts/evidence";
import { evidencePaths } from "./evidence-paths";
import { installationValues, NONE } from "./installation-values";
import { prefillOf } from "./taken-over";

const zone = "Europe/Paris";
const empty = installationValues(null, zone);

function tool(id: string, kind: Instrument["kind"], serial: string): Instrument {
  return {
    id,
    kind,
    serial,
    label: null,
    make: null,
    range: null,
    probeClass: null,
    outOfService: null,
    notes: null,
    certificates: [],
    calibration: "none",
    placements: [],
    archivedAt: null,
    can: { edit: true },
  };
}
const kit = [
  tool("1", "flowMeter", "FM 50417"),
  tool("2", "logger", "LG-0712"),
  tool("3", "probe", "T-1"),
];

test("what a file knows fills the form, by serial where the kit has it", () => {
  const address = evidencePaths.takeOver("1", "2", "3", null, {
    serial: "fm50417",
    boreMm: 82.5,
    wallMm: 3.2,
    startsAt: "2026-05-17T23:30:00.000Z",
    supplyProbeSerial: "T-1",
    returnProbeSerial: "T-9",
  });
  expect(address).toContain("/evidence/new?");
  const params = Object.fromEntries(new URL(address, "http://x").searchParams);
  expect(prefillOf(params, kit, zone, empty)).toEqual({
    changes: {
      flowMeterId: "1",
      enteredBoreMm: 82.5,
      walls: "3.2",
      startDate: "2026-05-18",
      supply: { ...empty.supply, probeId: "3" },
    },
    unknownSerials: ["T-9"],
  });
});

test("a serial of whatever wrote the file is the logger's where the kit says so", () => {
  expect(prefillOf({ serial: "LG 0712" }, kit, zone, empty)?.changes).toEqual({ loggerId: "2" });
});

test("what somebody recorded stays, and nonsense in the address fills nothing", () => {
  const before = { ...empty, enteredBoreMm: 80, flowMeterId: "9" };
  expect(prefillOf({ boreMm: "82.5", serial: "FM50417" }, kit, zone, before)).toBeNull();
  const nonsense = { boreMm: "1e9", wallMm: "x", startsAt: "soon", soundSpeedMPerS: "" };
  expect(prefillOf(nonsense, kit, zone, empty)).toBeNull();
  expect(empty.flowMeterId).toBe(NONE);
});
