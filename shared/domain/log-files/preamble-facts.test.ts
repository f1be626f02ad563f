import { compareFacts, type RecordedFacts } from "./compare-facts";
import { labelAndValue } from "./find-header";
import { preambleFacts, type PreambleEntry } from "./preamble-facts";

const entry = (label: string, value: string, line = 1): PreambleEntry => ({ label, value, line });
const found = (label: string, value: string) =>
  preambleFacts([entry(label, value)]).map((fact) => [fact.kind, fact.value]);

const RECORD: RecordedFacts = {
  meterSerial: "FM 50417",
  loggerSerials: ["LG-0712"],
  supplyProbeSerial: "T-1",
  returnProbeSerial: "T-2",
  boreMm: 82.5,
  outsideDiameterMm: null,
  wallMm: null,
  soundSpeedMPerS: null,
  fluid: "water",
  intervalS: 60,
  siteNames: ["North Hall"],
  pointNames: ["CHW-1B", "Riser 1"],
};
const verdictOf = (label: string, value: string, record: Partial<RecordedFacts> = {}) => {
  const [fact] = compareFacts(preambleFacts([entry(label, value)]), { ...RECORD, ...record });
  return fact && [fact.verdict, fact.weight, fact.recorded];
};

describe("facts above the header", () => {
  it.each([
    ["Serial", "50417", "serial", null],
    ["Seriennummer", "LG-0712", "serial", null],
    ["Logger serial no.", "0712", "loggerSerial", null],
    ["Flow meter S/N", "FM-50417", "meterSerial", null],
    ["Seriennummer Fühler Vorlauf", "4711", "supplyProbeSerial", null],
    ["Return sensor serial number", "4712", "returnProbeSerial", null],
    ["Pipe inside diameter", "82.5 mm", "boreMm", 82.5],
    ["Innendurchmesser [mm]", "82,5", "boreMm", 82.5],
    ["Pipe inside diameter mm", "82.5", "boreMm", 82.5],
    ["Rohr innen mm", "82,5", "boreMm", 82.5],
    ["Pipe OD", "3.5 in", "outsideDiameterMm", 88.9],
    ["Außendurchmesser", "88,9 mm", "outsideDiameterMm", 88.9],
    ["Wandstärke (mm)", "3,2", "wallMm", 3.2],
    ["Pipe material", "Carbon steel", "pipeMaterial", null],
    ["Medium", "Wasser", "fluid", null],
    ["Sound velocity", "1482 m/s", "soundSpeedMPerS", 1482],
    ["Logging interval", "1 min", "intervalS", 60],
    ["Messintervall", "00:05:00", "intervalS", 300],
    ["Period", "60 s", "intervalS", 60],
    ["Flow unit", "m3/h", "unitSetting", null],
    ["Sommerzeit", "aus", "clock", null],
    ["Time zone", "UTC+1", "clock", null],
    ["Site", "North Hall", "siteName", null],
    ["Messstelle", "CHW-1B", "pointName", null],
  ])("%s: %s is %s %s", (label, value, kind, expected) => {
    expect(found(label, value)).toEqual([[kind, expected]]);
  });

  it("have no value where the unit or the decimal mark is open", () => {
    expect(found("Bore", "82.5")).toEqual([["boreMm", null]]);
    expect(found("Bore", "1,250 mm")).toEqual([["boreMm", null]]);
    expect(found("Bore", "DN 80")).toEqual([["boreMm", null]]);
    expect(found("Sound speed", "constructor")).toEqual([["soundSpeedMPerS", null]]);
  });

  it("are not made of other labels, of empty cells, or of sentences", () => {
    for (const [label, value] of [
      ["Unit", ""],
      ["Transducer serial", "88"],
      ["Lining thickness", "3 mm"],
      ["Firmware serial", "2.1"],
      ["Serial", "RS-232 port, 9600 baud; no parity"],
      ["Serial", "none"],
      ["Serial", "50417 Bore 82.5 mm"],
      ["Battery", "12 V"],
      ["x".repeat(80) + " serial", "1"],
    ] as const)
      expect(found(label, value)).toEqual([]);
  });

  it("are found where a line holds several of them", () => {
    const factsOf = (...cells: string[]) =>
      preambleFacts(labelAndValue({ line: 1, cells })).map(({ kind, cell }) => `${kind} ${cell}`);
    const both = ["serial 50417", "boreMm 82.5 mm"];
    expect(factsOf("Serial", "50417", "Bore", "82.5 mm")).toEqual(both);
    expect(factsOf("# Serial: 50417", "Bore: 82.5 mm")).toEqual(both);
    // A value in two cells, as a decimal comma leaves it, is no pair.
    expect(factsOf("Site", "North Hall", "Building B", "2nd floor")).toEqual([
      "siteName North Hall Building B 2nd floor",
    ]);
    expect(factsOf("Bore: 82", "5 mm")).toEqual(["boreMm 82 5 mm"]);
  });

  it("name their line and their cell", () => {
    expect(preambleFacts([entry("Serial", " 50417 ", 3)])).toEqual([
      { kind: "serial", line: 3, label: "Serial", cell: "50417", value: null },
    ]);
  });
});

describe("held against the record", () => {
  it("the same serial matches however it is written, another one is worth a look", () => {
    expect(verdictOf("Serial", "fm-50417")).toEqual(["matches", null, "FM 50417"]);
    expect(verdictOf("Serial", "LG 0712")).toEqual(["matches", null, "LG-0712"]);
    expect(verdictOf("Serial", "99")).toEqual(["differs", "look", "FM 50417, LG-0712"]);
    expect(verdictOf("Meter serial", "LG-0712")).toEqual(["differs", "look", "FM 50417"]);
    expect(verdictOf("Meter serial", "1", { meterSerial: null })).toEqual([
      "notRecorded",
      null,
      null,
    ]);
  });

  it("a bore off by more than a hundredth stops, one within matches", () => {
    expect(verdictOf("Bore", "82.0 mm")).toEqual(["matches", null, 82.5]);
    expect(verdictOf("Bore", "77.9 mm")).toEqual(["differs", "stop", 82.5]);
    expect(verdictOf("Bore", "77.9")).toEqual(["unclear", null, 82.5]);
    expect(verdictOf("OD", "88.9 mm")).toEqual(["notRecorded", null, null]);
  });

  it("a fluid, an interval and a name say what they can", () => {
    expect(verdictOf("Fluid", "Glykol 30 %")).toEqual(["differs", "look", "water"]);
    expect(verdictOf("Fluid", "Water")).toEqual(["matches", null, "water"]);
    expect(verdictOf("Interval", "5 min")).toEqual(["differs", "look", 60]);
    expect(verdictOf("Interval", "5 min", { intervalS: null })).toEqual(["shown", null, null]);
    expect(verdictOf("Site", "north-hall")).toEqual(["matches", null, "North Hall"]);
    expect(verdictOf("Site", "Weir Block")).toEqual(["shown", null, "North Hall"]);
  });
});
