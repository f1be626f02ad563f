import {
  bodyOf,
  fill,
  loopOf,
  openWith,
  pick,
  pointOf,
  press,
  sent,
  serverAnswers,
  serverRefuses,
  show,
  siteOf,
  visited,
} from "./test-kit";
import { fireEvent, screen, waitFor } from "@testing-library/react";
import { PIPE_TABLES } from "@shared/domain/pipes/pipe-tables";

import { EditPointScreen, NewPointScreen } from "./point-form-screen";

const create = "POST /loops/7/points";
// One table is enough: hundreds of options make every search by role slow.
const tables = PIPE_TABLES.filter(({ id }) => id === "asme-b36.10m-40").map(
  ({ sizes, ...table }) => ({
    ...table,
    rows: sizes.map((size) => ({ ...size, insideDiameterMm: size.boreMm })),
  }),
);

beforeEach(() => {
  openWith({ siteId: "1", loopId: "7" });
  serverAnswers("GET /sites/1", siteOf());
  serverAnswers("GET /loops/7", loopOf({ designFlowM3PerHour: 30 }));
  serverAnswers("GET /loops/7/points?archived=true", { items: [] });
  serverAnswers("GET /pipe-tables", { items: tables });
});

async function open() {
  show(<NewPointScreen />);
  await screen.findByLabelText("Code");
}

it("picks no meter side by itself, and does not save without one", async () => {
  await open();
  for (const side of screen.getAllByRole("radio", { name: /^(Supply|Return)/ }))
    expect(side).not.toBeChecked();
  fill("Code", "MP-1");
  fill("Name", "Main meter");
  fireEvent.change(screen.getByLabelText("Role"), { target: { value: "main" } });
  pick(/^Not known/);
  press("Add a metering point");
  expect(await screen.findByText("Choose the pipe the flow meter sits on.")).toBeVisible();
  expect(sent.map(({ call }) => call)).not.toContain(create);

  serverAnswers(create, pointOf());
  pick(/^Return/);
  press("Add a metering point");
  await waitFor(() => expect(visited.replace).toHaveBeenCalledWith("/sites/1/loops/7/points"));
  expect(bodyOf(create)).toEqual({
    code: "MP-1",
    name: "Main meter",
    role: "main",
    gapRule: "survey",
    meterSide: "return",
    parentPointId: null,
    pipe: null,
    notes: null,
  });
});

it("works the bore out while a pipe is chosen from a table, with the speed at design flow", async () => {
  await open();
  await screen.findByText("ASME B36.10M, Schedule 40, carbon steel");
  fireEvent.change(screen.getByLabelText("Table"), { target: { value: "asme-b36.10m-40" } });
  fireEvent.change(screen.getByLabelText("Nominal size"), { target: { value: "100" } });
  // ASME B36.10M, NPS 4 schedule 40: 114.3 × 6.02 mm, bore 102.26 mm.
  const drawing = /bore 102.26\smm, wall 6.02\smm, outside 114.30\smm/;
  expect(screen.getByRole("img", { name: drawing })).toBeVisible();
  // 30 m³/h through 102.26 mm: 30 ÷ 3600 ÷ 0.0082130 m² = 1.0147 m/s, by hand.
  expect(screen.getByText(/water moves at 1.01\sm\/s/)).toBeVisible();
});

it("refuses a wall that leaves no bore, and only warns of an unusual one", async () => {
  await open();
  pick(/^Measured/);
  fill("Outside diameter", "50");
  fill("Wall", "12");
  expect(screen.getByText(/Unusual wall for this diameter/)).toBeVisible();
  fill("Wall", "25");
  press("Add a metering point");
  expect(await screen.findByText(/leave no bore/)).toBeVisible();
  expect(sent.map(({ call }) => call)).not.toContain(create);
});

it("takes diameters in inches where the site uses them, and stores millimetres", async () => {
  serverAnswers("GET /sites/1", siteOf({ unitSystem: "inchPound" }));
  serverAnswers(create, pointOf());
  await open();
  fill("Code", "MP-1");
  fill("Name", "Main meter");
  fireEvent.change(screen.getByLabelText("Role"), { target: { value: "main" } });
  pick(/^Supply/);
  pick(/^Measured/);
  fill("Outside diameter", "4.5");
  fill("Wall", "0.237");
  press("Add a metering point");
  await waitFor(() => expect(visited.replace).toHaveBeenCalled());
  const { pipe } = bodyOf(create) as { pipe: { outsideDiameterMm: number; wallMm: number } };
  // An inch is 25.4 mm.
  expect(pipe.outsideDiameterMm).toBeCloseTo(114.3, 9);
  expect(pipe.wallMm).toBeCloseTo(6.0198, 9);
});

it("shows a taken code at its field in words of its own", async () => {
  openWith({ siteId: "1", loopId: "7", pointId: "9" });
  serverAnswers("GET /loops/7/points?archived=true", { items: [pointOf()] });
  serverAnswers("GET /points/9/bores", { items: [] });
  const message = "Another point of this loop has this code.";
  serverRefuses("PATCH /points/9", 422, "invalid", [
    { pointer: "/body/code", code: "code-taken", message },
  ]);
  show(<EditPointScreen />);
  fill("Code", await screen.findByLabelText("Code").then(() => "MP-2"));
  press("Save changes");
  await waitFor(() => expect(screen.getByLabelText("Code")).toHaveAccessibleDescription(message));
});

it("keeps what was typed across a reload, until it is thrown away", async () => {
  serverAnswers("GET /pipe-tables", { items: [] });
  show(<NewPointScreen />).unmount();
  const first = show(<NewPointScreen />);
  fill("Code", await screen.findByLabelText("Code").then(() => "MP-77"));
  first.unmount();
  show(<NewPointScreen />);
  expect(await screen.findByLabelText("Code")).toHaveValue("MP-77");
  press("Throw it away");
  expect(screen.getByLabelText("Code")).toHaveValue("");
});
