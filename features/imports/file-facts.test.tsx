import { screen, within } from "@testing-library/react";
import type { FileFact, ImportDetail, ImportFile } from "@shared/contracts/imports";
import { show } from "@features/places/test-kit";
import { DifferingFacts, FactsOfFile } from "./file-facts";
import { SourceOfFile } from "./source-of-file";

function fact(more: Partial<FileFact>): FileFact {
  return {
    kind: "serial",
    line: 2,
    label: "Serial",
    cell: "50417",
    value: null,
    verdict: "matches",
    recorded: "50417",
    weight: null,
    ...more,
  };
}

function fileOf(facts: FileFact[], more: Partial<ImportFile> = {}): ImportFile {
  return {
    id: "7",
    name: "july.csv",
    bytes: 100,
    sha256: "ab",
    source: null,
    uploadedAt: "2026-05-18T10:00:00.000Z",
    sameAs: null,
    alsoFor: [],
    unreadable: null,
    recognition: null,
    recipe: null,
    questions: [],
    facts,
    heldAgainst: null,
    ...more,
  } as ImportFile;
}

const detailOf = (...files: ImportFile[]) =>
  ({
    id: "1",
    site: { id: "3" },
    loop: { id: "4" },
    point: { id: "5" },
    files,
    checks: null,
  }) as unknown as ImportDetail;

test("each fact says whether it is as recorded, with its line", () => {
  const file = fileOf([
    fact({}),
    fact({
      kind: "boreMm",
      line: 4,
      label: "Bore",
      cell: "77.9 mm",
      value: 77.9,
      verdict: "differs",
      recorded: 105.3,
      weight: "stop",
    }),
    fact({
      kind: "wallMm",
      line: 5,
      label: "Wall",
      cell: "3,2",
      verdict: "unclear",
      recorded: 3.6,
    }),
  ]);
  show(<FactsOfFile file={file} detail={detailOf(file)} />);
  const rows = within(screen.getByRole("list")).getAllByRole("listitem");
  expect(rows.map(({ textContent }) => textContent)).toEqual([
    "Serial number50417As recorded. Line 2: Serial",
    expect.stringContaining("Recorded: 105.3 mm. Flow goes with the square of the bore"),
    expect.stringContaining("the unit or the decimal mark is open. Recorded: 3.6 mm."),
  ]);
  expect(screen.queryByRole("link", { name: "Take over into the evidence" })).toBeNull();
  expect(screen.getByRole("link", { name: "Open the evidence of this point" })).toBeTruthy();
});

test("what is not recorded opens the evidence form filled in, of the installation that speaks", () => {
  const facts = [
    fact({ verdict: "notRecorded", recorded: null }),
    fact({ kind: "boreMm", cell: "82.5 mm", value: 82.5, verdict: "notRecorded", recorded: null }),
    fact({ kind: "soundSpeedMPerS", cell: "1482", value: null, verdict: "unclear" }),
  ];
  const file = fileOf(facts, { heldAgainst: "9" });
  show(<FactsOfFile file={file} detail={detailOf(file)} />);
  const link = screen.getByRole("link", { name: "Take over into the evidence" });
  const address = new URL(link.getAttribute("href") ?? "", "http://x");
  expect(address.pathname).toBe("/sites/3/loops/4/points/5/evidence/9");
  expect(Object.fromEntries(address.searchParams)).toEqual({ serial: "50417", boreMm: "82.5" });
});

test("the Checks step names only what differs, and the file where there are several", () => {
  const first = fileOf([fact({}), fact({ verdict: "differs", recorded: "FM-1", weight: "look" })]);
  const second = fileOf([], { id: "8", name: "temperatures.csv" });
  show(<DifferingFacts detail={detailOf(first, second)} />);
  const rows = within(screen.getByRole("list")).getAllByRole("listitem");
  expect(rows).toHaveLength(1);
  expect(rows[0]?.textContent).toContain("Line 2 of july.csv: Serial");
});

test("an archive names what of it was left out, and what a person should look at", () => {
  const source: NonNullable<ImportFile["source"]> = {
    kind: "zip",
    name: "visit.csv",
    bytes: 900,
    sha256: "cd",
    member: "a/july.csv",
    leftOut: [{ name: "photo.jpg", because: "notText" }],
    formulasWithoutValue: 2,
    nameMisleads: true,
    countsFrom1904: false,
  };
  show(<SourceOfFile importId="1" file={fileOf([], { source })} source={source} />);
  expect(screen.getByText(/a\/july\.csv in visit\.csv/)).toBeTruthy();
  expect(screen.getByText("Left out: photo.jpg (no text)")).toBeTruthy();
  expect(
    screen.getByText(/visit\.csv is a zip archive, though its name says otherwise/),
  ).toBeTruthy();
  expect(screen.getByText(/2 formulas were saved without their results/)).toBeTruthy();
  const links = screen.getAllByRole("link").map((link) => link.getAttribute("href"));
  expect(links).toEqual([
    expect.stringMatching(/\/imports\/1\/files\/7\/raw$/),
    expect.stringMatching(/\/imports\/1\/files\/7\/text$/),
  ]);
});
