import { act, fireEvent, render, screen, within } from "@testing-library/react";
import { useState } from "react";

import { PreferencesProvider } from "@features/i18n";

import { Button } from "./button";
import { ChoiceTiles } from "./choice-tiles";
import { Dialog } from "./dialog";
import { Figure } from "./figure";
import { Form } from "./form";
import { NumberField } from "./number-field";
import { Segments } from "./segments";
import { Table } from "./table";
import { TextField } from "./text-field";
import { useBreakpoint } from "./theme";

jest.mock("./theme/use-breakpoint", () => ({ useBreakpoint: jest.fn(() => "wide") }));
// Links are the router's; here only what surrounds them is checked.
jest.mock("expo-router", () => ({
  Link: ({ children }: { children: React.ReactNode }) => children,
}));

const show = (ui: React.ReactNode) => render(<PreferencesProvider>{ui}</PreferencesProvider>);
const useWidth = jest.mocked(useBreakpoint);
beforeEach(() => useWidth.mockReturnValue("wide"));

describe("Figure", () => {
  it("is read whole, with its ± and its unit in words", () => {
    const open = jest.fn();
    show(<Figure value={14938.7} uncertainty={498.7} unit="kWh" onOpenWorkings={open} />);
    const button = screen.getByRole("button", {
      name: "14,940 plus or minus 500 kilowatt hours, show workings",
    });
    fireEvent.click(button);
    expect(open).toHaveBeenCalledTimes(1);
  });

  it("says that a value is not known instead of showing 0", () => {
    show(<Figure value={null} unit="kWh" said="Energy" />);
    expect(screen.getByText("Energy: not known")).toBeTruthy();
    expect(screen.queryByText(/0/)).toBeNull();
  });
});

function Wall({ onReport }: { onReport: (value: number | null, readable: boolean) => void }) {
  const [value, setValue] = useState<number | null>(4.5);
  return (
    <>
      <NumberField
        label="Wall"
        unit="mm"
        value={value}
        min={0.5}
        max={30}
        onChange={(next, readable) => {
          setValue(next);
          onReport(next, readable);
        }}
      />
      <Button label="Set" onPress={() => setValue(6)} />
    </>
  );
}

describe("NumberField", () => {
  it("reports what is typed, keeps the typing, and names the range once left", () => {
    const report = jest.fn();
    show(<Wall onReport={report} />);
    const input = screen.getByLabelText<HTMLInputElement>("Wall");
    fireEvent.change(input, { target: { value: "45," } });
    expect(input.value).toBe("45,");
    expect(report).toHaveBeenLastCalledWith(45, false);
    expect(input.getAttribute("aria-invalid")).toBeNull();
    fireEvent.blur(input);
    expect(input.getAttribute("aria-invalid")).toBe("true");
    const note = document.getElementById(input.getAttribute("aria-describedby") ?? "");
    expect(note?.textContent).toBe("Use a value from 0.5\u00A0mm to 30\u00A0mm");
  });

  it("keeps an unreadable entry for correction and reports null", () => {
    const report = jest.fn();
    show(<Wall onReport={report} />);
    const input = screen.getByLabelText<HTMLInputElement>("Wall");
    fireEvent.change(input, { target: { value: "4.5 mm" } });
    expect(input.value).toBe("4.5 mm");
    expect(report).toHaveBeenLastCalledWith(null, false);
  });

  it("shows a value set from outside", () => {
    show(<Wall onReport={() => undefined} />);
    fireEvent.change(screen.getByLabelText("Wall"), { target: { value: "x" } });
    fireEvent.click(screen.getByRole("button", { name: "Set" }));
    expect(screen.getByLabelText<HTMLInputElement>("Wall").value).toBe("6");
  });
});

describe("Segments and ChoiceTiles", () => {
  it("pick nothing until somebody does", () => {
    const pick = jest.fn();
    const options = [
      { value: "fill", label: "Fill" },
      { value: "leave", label: "Leave missing" },
    ];
    show(<Segments label="Gap" value={null} options={options} onChange={pick} />);
    const radios = screen.getAllByRole("radio");
    expect(radios.map((radio) => radio.getAttribute("aria-checked"))).toEqual(["false", "false"]);
    fireEvent.click(screen.getByRole("radio", { name: "Leave missing" }));
    expect(pick).toHaveBeenCalledWith("leave");
  });

  it("move with the arrow keys, round the end", () => {
    const pick = jest.fn();
    const choices = [
      { value: "a", label: "Keep the first" },
      { value: "b", label: "Keep the last" },
    ];
    show(<ChoiceTiles label="Conflict" value="b" choices={choices} onChange={pick} />);
    const last = screen.getByRole("radio", { name: /last/ });
    fireEvent.keyDown(last, { key: "ArrowDown" });
    expect(pick).toHaveBeenCalledWith("a");
    expect(document.activeElement).toBe(screen.getByRole("radio", { name: /first/ }));
  });
});

describe("Button", () => {
  it("says why it is off, and does nothing", () => {
    const press = jest.fn();
    show(<Button label="Import" offBecause="Answer the date order first." onPress={press} />);
    const button = screen.getByRole("button", { name: "Import" });
    fireEvent.click(button);
    expect(press).not.toHaveBeenCalled();
    const reason = document.getElementById(button.getAttribute("aria-describedby") ?? "");
    expect(reason?.textContent).toBe("Answer the date order first.");
  });

  it("sends the form it stands in", () => {
    const send = jest.fn();
    show(
      <Form label="Sign in" onSubmit={send}>
        <TextField label="Email" value="" onChange={() => undefined} />
        <Button submit label="Send" />
      </Form>,
    );
    fireEvent.click(screen.getByRole("button", { name: "Send" }));
    expect(send).toHaveBeenCalledTimes(1);
  });
});

interface Day {
  day: string;
  energy: number;
}
const days: Day[] = [
  { day: "Mon 11", energy: 2261 },
  { day: "Tue 12", energy: 2272 },
];
const dayTable = (
  <Table<Day>
    caption="Days"
    columns={[
      { key: "day", header: "Day", render: (row) => row.day },
      {
        key: "energy",
        header: "Energy",
        unit: "kWh",
        figure: (row) => ({ value: row.energy, uncertainty: 75 }),
      },
    ]}
    rows={days}
    rowKey={(row) => row.day}
    card={{ title: (row) => row.day, figure: (row) => `${row.energy} kWh` }}
  />
);

describe("Table", () => {
  it("is a real table with row heads, value and ± in cells of their own", () => {
    show(dayTable);
    const table = screen.getByRole("table", { name: "Days" });
    const row = within(table).getByRole("row", { name: /Tue 12/ });
    expect(within(row).getByRole("rowheader", { name: "Tue 12" })).toBeTruthy();
    const cells = within(row)
      .getAllByRole("cell")
      .map((cell) => cell.textContent);
    expect(cells).toEqual(["2,272", "±\u00A075"]);
  });

  it("turns into cards on a phone", () => {
    useWidth.mockReturnValue("phone");
    show(dayTable);
    expect(screen.queryByRole("table")).toBeNull();
    const cards = within(screen.getByRole("list", { name: "Days" })).getAllByRole("listitem");
    expect(cards.map((card) => card.textContent)).toEqual(["Mon 112261 kWh", "Tue 122272 kWh"]);
  });
});

function Lock() {
  const [open, setOpen] = useState(false);
  return (
    <>
      <Button label="Lock" onPress={() => setOpen(true)} />
      <Dialog
        open={open}
        title="Lock April?"
        confirmLabel="Lock it"
        onConfirm={() => undefined}
        onClose={() => setOpen(false)}
      >
        6 zones.
      </Dialog>
    </>
  );
}

describe("Dialog", () => {
  it("takes focus, keeps it, and gives it back on Escape", () => {
    show(<Lock />);
    const opener = screen.getByRole("button", { name: "Lock" });
    act(() => opener.focus());
    fireEvent.click(opener);
    const dialog = screen.getByRole("alertdialog", { name: "Lock April?" });
    expect(dialog.contains(document.activeElement)).toBe(true);
    const confirm = screen.getByRole("button", { name: "Lock it" });
    act(() => confirm.focus());
    fireEvent.keyDown(confirm, { key: "Tab" });
    expect(document.activeElement).toBe(screen.getByRole("button", { name: "Cancel" }));
    fireEvent.keyDown(dialog, { key: "Escape" });
    expect(screen.queryByRole("alertdialog")).toBeNull();
    expect(document.activeElement).toBe(opener);
  });
});
