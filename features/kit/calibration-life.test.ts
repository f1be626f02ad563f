import type { Certificate, Instrument } from "@shared/contracts/evidence";
import { bySoonest, certificateToday, lifeScaleOf, placeOf } from "./calibration-life";

const today = "2026-05-19";

function certificate(issuedOn: string, dueOn: string | null, withdrawn = false): Certificate {
  return {
    id: "1",
    number: "C",
    laboratory: null,
    accredited: null,
    issuedOn,
    dueOn,
    expanded: 1,
    k: 2,
    state: "inDate",
    recordedBy: "Somebody",
    withdrawnAt: withdrawn ? "2026-01-01T00:00:00Z" : null,
    withdrawnReason: null,
  };
}

function instrument(
  serial: string,
  calibration: Instrument["calibration"],
  certificates: Certificate[],
): Instrument {
  return {
    id: serial,
    kind: "flowMeter",
    serial,
    label: null,
    make: null,
    range: null,
    probeClass: null,
    outOfService: null,
    notes: null,
    certificates,
    calibration,
    placements: [],
    archivedAt: null,
    can: { edit: false },
  };
}

it("one scale holds every life, and today lies where it belongs on it", () => {
  const kit = [
    instrument("A", "inDate", [certificate("2025-05-19", "2027-05-19")]),
    instrument("B", "lapsed", [certificate("2025-11-01", "2026-04-01")]),
  ];
  const scale = lifeScaleOf(kit, today);
  expect(placeOf(scale, "2025-05-19")).toBe(0);
  expect(placeOf(scale, "2027-05-19")).toBe(1);
  expect(placeOf(scale, today)).toBe(0.5);
});

it("a certificate of the future or one withdrawn does not speak for today", () => {
  const kit = instrument("A", "inDate", [
    certificate("2026-06-01", null),
    certificate("2025-02-01", null),
    certificate("2026-03-01", null, true),
  ]);
  expect(certificateToday(kit, today)?.issuedOn).toBe("2025-02-01");
});

it("what has run out stands first, then what runs out soonest", () => {
  const kit = [
    instrument("later", "inDate", [certificate("2026-01-01", "2027-01-01")]),
    instrument("sooner", "inDate", [certificate("2026-01-01", "2026-11-01")]),
    instrument("out", "lapsed", [certificate("2024-01-01", "2025-01-01")]),
    instrument("bare", "none", []),
  ];
  expect(kit.sort(bySoonest(today)).map(({ serial }) => serial)).toEqual([
    "out",
    "bare",
    "sooner",
    "later",
  ]);
});
