import {
  bodyOf,
  fill,
  loopOf,
  openWith,
  pick,
  press,
  sent,
  serverAnswers,
  serverRefuses,
  show,
  siteOf,
  visited,
} from "./test-kit";
import { screen, waitFor } from "@testing-library/react";

import type { PumpFields } from "@shared/contracts/shape";

import { PumpFormScreen } from "./pump-form-screen";

const pump: PumpFields = {
  controlledHead: true,
  staticHeadM: 8,
  designHeadM: 26,
  designFlowM3PerHour: 130,
  efficiency: 0.58,
  minimumFlowM3PerHour: 20,
  pricePerKwh: "0.187",
};
const answer = (known: PumpFields | null, edit = true) => ({
  pump: known,
  currency: "GBP",
  can: { edit },
});

beforeEach(() => {
  openWith({ siteId: "1", loopId: "7" });
  serverAnswers("GET /sites/1", siteOf());
  serverAnswers("GET /loops/7", loopOf());
  serverAnswers("GET /loops/7/pump", answer(null));
});

it("asks whether head stays, and for the whole curve once part of it is given", async () => {
  show(<PumpFormScreen />);
  await screen.findByRole("heading", { name: "Pump of CHW-1" });
  expect(screen.queryByLabelText("Head at no flow")).toBeNull();
  fill("Head at design flow", "26");
  press("Save changes");
  expect(await screen.findByText("Say whether part of the head stays.")).toBeVisible();
  expect(screen.getAllByText("Head, flow and efficiency at design go together.")).toHaveLength(2);
  pick(/^Yes/);
  fill("Head at no flow", "27");
  press("Save changes");
  expect(await screen.findByText("Cannot be above the head at design flow.")).toBeVisible();
  expect(sent.filter(({ call }) => call.startsWith("PUT"))).toEqual([]);
});

it("sends what is typed, the efficiency as a share and the price as text", async () => {
  serverAnswers("PUT /loops/7/pump", answer(pump));
  show(<PumpFormScreen />);
  await screen.findByRole("heading", { name: "Pump of CHW-1" });
  pick(/^Yes/);
  fill("Head at no flow", "8");
  fill("Head at design flow", "26");
  fill("Design flow of the pump", "130");
  fill("Efficiency", "58");
  fill("Least flow of the plant", "20");
  fill("Price of electricity", "0,187");
  press("Save changes");
  await waitFor(() => expect(visited.replace).toHaveBeenCalledWith("/loops/7?view=load"));
  expect(bodyOf("PUT /loops/7/pump")).toEqual(pump);
});

it("sends a pump back as it came, and drops the head that no longer stays", async () => {
  serverAnswers("GET /loops/7/pump", answer(pump));
  serverAnswers("PUT /loops/7/pump", answer(pump));
  show(<PumpFormScreen />);
  await screen.findByDisplayValue("130");
  pick(/^No/);
  press("Save changes");
  await waitFor(() => expect(visited.replace).toHaveBeenCalled());
  expect(bodyOf("PUT /loops/7/pump")).toEqual({
    ...pump,
    controlledHead: false,
    staticHeadM: null,
  });
});

it("forgets a pump, and shows no form to who may not edit", async () => {
  serverAnswers("GET /loops/7/pump", answer(pump));
  serverAnswers("DELETE /loops/7/pump", {});
  const { unmount } = show(<PumpFormScreen />);
  await screen.findByDisplayValue("130");
  press("Forget the pump");
  await waitFor(() => expect(visited.replace).toHaveBeenCalledWith("/loops/7?view=load"));
  unmount();
  serverAnswers("GET /loops/7/pump", answer(pump, false));
  show(<PumpFormScreen />);
  await waitFor(() => expect(screen.queryByRole("button", { name: "Save changes" })).toBeNull());
});

it("shows what the server refuses at its field", async () => {
  serverAnswers("GET /loops/7/pump", answer(pump));
  serverRefuses("PUT /loops/7/pump", 422, "invalid", [
    { pointer: "/body/staticHeadM", code: "above-design-head", message: "Too high." },
  ]);
  show(<PumpFormScreen />);
  await screen.findByDisplayValue("130");
  press("Save changes");
  expect(await screen.findByText("Too high.")).toBeVisible();
});
