import { screen } from "@testing-library/react";

import type { Correction } from "@shared/contracts/corrections";
import { makeFormat } from "@features/i18n";
import { show } from "@features/places/test-kit";

import { CorrectionCard } from "./correction-card";

const correctionOf = (change: Partial<Correction>): Correction => ({
  id: "3",
  pointId: "9",
  importId: null,
  points: [{ id: "9", code: "CHW-1B.P1", loopTag: "CHW-1B" }],
  change: { kind: "flipFlow", from: "2026-05-11T00:00:00.000Z", to: null },
  reason: "mounted the wrong way round",
  state: "proposed",
  effect: null,
  volumePercent: null,
  failure: null,
  createdAt: "2026-05-18T08:00:00.000Z",
  createdBy: "Mara Ilves",
  appliedAt: null,
  appliedBy: null,
  withdrawnAt: null,
  withdrawnBy: null,
  withdrawnReason: null,
  can: { apply: false, withdraw: false },
  ...change,
});

const days = { from: "2026-05-11T00:00:00.000Z", to: "2026-05-18T00:00:00.000Z" };
const kwh = (heatingKwh: number, coolingKwh: number) => ({ heatingKwh, coolingKwh });

function card(change: Partial<Correction>) {
  const format = makeFormat("en", "si", "UTC");
  return show(
    <CorrectionCard correction={correctionOf(change)} format={format} onWithdraw={() => {}} />,
  );
}

it("says in words that no energy changes, and how many readings do", () => {
  const effect = {
    ...days,
    before: kwh(0, 1200),
    after: kwh(0, 1200),
    volume: null,
    rowsChanged: 12,
  };
  card({ effect });
  expect(screen.getByText("No energy changes; 12 readings do.")).toBeVisible();
  expect(screen.queryByText(/no change/)).toBeNull();
});

it("shows the volume with its ± where it moves, though no energy does", () => {
  const effect = {
    ...days,
    before: kwh(0, 0),
    after: kwh(0, 0),
    volume: { beforeM3: 100, afterM3: 104 },
    rowsChanged: 1,
  };
  const { unmount } = card({ effect, volumePercent: 3 });
  expect(screen.getByText("No energy changes; 1 reading does.")).toBeVisible();
  expect(screen.getByText(/^\+4(\.0+)?.m³ \(from 100(\.0+)?.m³ to 104(\.0+)?.m³\)$/)).toBeVisible();
  expect(screen.getByText(/^104\.0 ± 3\.1.m³$/)).toBeVisible();
  unmount();
  card({ effect, volumePercent: null });
  expect(screen.getByText("± unknown")).toBeVisible();
});

it("shows what the energy becomes of each register that moves", () => {
  const effect = {
    ...days,
    before: kwh(0, 1200),
    after: kwh(0, 1216.6),
    volume: null,
    rowsChanged: 49,
  };
  card({ effect });
  expect(screen.getByText(/^\+16\.6.kWh \(from 1,200.kWh to 1,217.kWh\)$/)).toBeVisible();
  expect(screen.getByText("49 readings changed")).toBeVisible();
});
