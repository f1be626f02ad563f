import {
  bodyOf,
  fill,
  loopOf,
  openWith,
  pick,
  press,
  sent,
  serverAnswers,
  show,
  siteOf,
  visited,
} from "./test-kit";
import { fireEvent, screen, waitFor } from "@testing-library/react";

import { EditLoopScreen, NewLoopScreen } from "./loop-form-screen";

const create = "POST /sites/1/loops";

beforeEach(() => {
  openWith({ siteId: "1" });
  serverAnswers("GET /sites/1", siteOf());
  serverAnswers("GET /sites/1/buildings", { items: [] });
  serverAnswers("GET /sites/1/loops?archived=true", { items: [] });
});

async function open() {
  show(<NewLoopScreen />);
  fill("Tag", await screen.findByLabelText("Tag").then(() => "CHW-1"));
  fill("Name", "Chilled mains");
}

it("needs a service, and says that a blank gauge means 16 bar absolute", async () => {
  await open();
  expect(screen.getByText(/Assumed 16.00 bar absolute/)).toBeVisible();
  press("Add a loop");
  expect(await screen.findByText("Choose what the loop carries.")).toBeVisible();
  expect(sent.map(({ call }) => call)).not.toContain(create);
});

it("works the absolute pressure out beside the gauge, and stores MPa", async () => {
  serverAnswers(create, loopOf());
  await open();
  pick(/^Chilled water/);
  fill("Gauge pressure", "4");
  // 4 bar on the gauge and one standard atmosphere of 1.01325 bar.
  expect(screen.getByText("5.01")).toBeVisible();
  press("Add a loop");
  await waitFor(() => expect(visited.replace).toHaveBeenCalledWith("/sites/1/loops/7/points"));
  const body = bodyOf(create) as { gaugePressureMPa: number };
  expect(body).toMatchObject({ tag: "CHW-1", service: "chilled", fluid: { kind: "water" } });
  expect(body.gaugePressureMPa).toBeCloseTo(0.4, 12);
});

it("asks for percent and basis of glycol, and says where the mixture freezes", async () => {
  serverAnswers(create, loopOf());
  await open();
  pick(/^Chilled water/);
  pick("Propylene glycol");
  press("Add a loop");
  expect(await screen.findByText("Give the percentage of glycol.")).toBeVisible();
  fill("Glycol", "30");
  pick("Mass");
  // ASHRAE tables: 30 % by mass is 29.4 % by volume and freezes at −12.7 °C.
  expect(screen.getByText("29.4")).toBeVisible();
  expect(screen.getByText("−12.7")).toBeVisible();
  expect(screen.queryByText(/Under 10 % by volume/)).toBeNull();
  fill("Tested on", "2026-03-02");
  fireEvent.change(screen.getByLabelText("Tested with"), { target: { value: "refractometer" } });
  press("Add a loop");
  await waitFor(() => expect(visited.replace).toHaveBeenCalled());
  expect(bodyOf(create)).toMatchObject({
    fluid: {
      kind: "propyleneGlycol",
      percent: 30,
      basis: "mass",
      testedOn: "2026-03-02",
      testMethod: "refractometer",
    },
  });
});

it("says what a weak mixture costs in certainty, and that a strong one gives no energy", async () => {
  await open();
  pick("Ethylene glycol");
  pick("Volume");
  fill("Glycol", "5");
  expect(screen.getByText(/Under 10 % by volume there are no tables/)).toBeVisible();
  fill("Glycol", "65");
  expect(screen.getByText(/the loop gives no energy/)).toBeVisible();
});

it("does not say that energy changes where only the test of the glycol does", async () => {
  openWith({ siteId: "1", loopId: "7" });
  const fluid = {
    kind: "propyleneGlycol",
    percent: 30,
    basis: "mass",
    testedOn: null,
    testMethod: null,
  } as const;
  serverAnswers("GET /sites/1/loops?archived=true", {
    items: [loopOf({ hasReadings: true, fluid })],
  });
  show(<EditLoopScreen />);
  await screen.findByLabelText("Tag");
  fill("Tested on", "2026-03-02");
  expect(screen.queryByText("Energy changes.")).toBeNull();
  fill("Glycol", "31");
  expect(screen.getByText("Energy changes.")).toBeVisible();
});

it("suggests cut-offs from the design flow and the service, and never sets them alone", async () => {
  serverAnswers(create, loopOf());
  await open();
  pick(/^Chilled water/);
  fill("Design flow", "45");
  expect(screen.getByLabelText("Flow cut-off")).toHaveValue("");
  // 2 % of 45 m³/h.
  press("Use 0.90\u00A0m³/h");
  expect(screen.getByLabelText("Flow cut-off")).toHaveValue("0.9");
  press("Add a loop");
  await waitFor(() => expect(visited.replace).toHaveBeenCalled());
  expect(bodyOf(create)).toMatchObject({ flowCutOffM3PerHour: 0.9, deltaTCutOffK: null });
});

it("does not save a value outside its range", async () => {
  await open();
  pick(/^Hot water/);
  fill("Design ΔT", "60");
  press("Add a loop");
  expect(await screen.findByText("Not a number, or outside the range.")).toBeVisible();
  expect(sent.map(({ call }) => call)).not.toContain(create);
});

it("offers archiving, not removal, for a loop with readings, and says when energy changes", async () => {
  openWith({ siteId: "1", loopId: "7" });
  const can = { edit: true, archive: true, remove: false, addPoint: true };
  const items = [loopOf({ hasReadings: true, can })];
  serverAnswers("GET /sites/1/loops?archived=true", { items });
  serverAnswers("PATCH /loops/7", loopOf({ archivedAt: "2026-03-02T09:00:00.000Z" }));
  show(<EditLoopScreen />);
  await screen.findByLabelText("Tag");
  expect(screen.queryByRole("button", { name: "Remove CHW-1" })).toBeNull();
  fill("Gauge pressure", "3");
  expect(screen.getByText("Energy changes.")).toBeVisible();
  press("Archive CHW-1");
  await waitFor(() => expect(visited.replace).toHaveBeenCalledWith("/sites/1"));
  expect(bodyOf("PATCH /loops/7")).toEqual({ archived: true });
});

it("asks before it removes, naming the loop", async () => {
  openWith({ siteId: "1", loopId: "7" });
  serverAnswers("GET /sites/1/loops?archived=true", { items: [loopOf()] });
  serverAnswers("DELETE /loops/7", {});
  show(<EditLoopScreen />);
  await screen.findByLabelText("Tag");
  press("Remove CHW-1");
  const dialog = screen.getByRole("alertdialog", { name: "Remove CHW-1?" });
  expect(dialog).toBeVisible();
  expect(sent.map(({ call }) => call)).not.toContain("DELETE /loops/7");
});
