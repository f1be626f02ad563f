import { meterComparisonBody } from "./comparison-factories";
import { plainRecipe } from "./import-factories";

/** What an endpoint takes beside its ids, filled in so that validation lets it through. */
export interface SampleInput {
  readonly query?: Readonly<Record<string, string>>;
  /** A text ":name" stands for the id of that name. */
  readonly body?: object;
  /** Text of a file in the multipart field `file`. */
  readonly file?: string;
}

const days = { from: "2026-02-02", to: "2026-02-09" };
const instants = { from: "2026-02-02T00:00:00Z", to: "2026-02-09T00:00:00Z" };

const flip = { kind: "flipFlow", from: instants.from, to: null };

/**
 * By operation, where nothing at all will not do. The tenancy test sends them with the owner's ids
 * too, so one that is wrong shows.
 */
export const sampleInputs: Readonly<Record<string, SampleInput>> = {
  createBuilding: { body: { name: "East wing" } },
  createLoop: { body: { tag: "LTHW-9", name: "Ring main", service: "hot" } },
  createPoint: { body: { code: "P-9", name: "Riser 9", role: "riser", meterSide: "return" } },
  getSiteOverview: { query: days },
  getEnergy: { query: instants },
  getPointSummary: { query: days },
  getSeries: { query: { ...instants, pixels: "300" } },
  getReadings: { query: instants },
  downloadIntervals: { query: instants },
  downloadReadings: { query: instants },
  getCompanionSeries: { query: { ...instants, pixels: "300" } },
  getWorkings: { query: { ...days, figure: "energy" } },
  downloadWorkingsCsv: { query: { ...days, figure: "energy" } },
  downloadWorkingsPdf: { query: { ...days, figure: "energy" } },
  getPointShape: { query: instants },
  downloadDurationCurve: { query: instants },
  saveLoopPump: {
    body: {
      controlledHead: false,
      staticHeadM: null,
      designHeadM: 20,
      designFlowM3PerHour: 40,
      efficiency: 0.6,
      minimumFlowM3PerHour: null,
      pricePerKwh: "0.21",
    },
  },
  getDayMarks: { query: days },
  proposeCorrection: { body: { change: flip, reason: "Arrow against the flow" } },
  withdrawCorrection: { body: { reason: "Right after all" } },
  proposeFill: { body: { ...instants, method: "likeDays", reason: "Flat battery" } },
  addImportFile: { file: "time,flow\n2026-02-02 00:00,1.0\n" },
  alsoForPoint: { body: { pointId: ":pointId" } },
  addBatchFile: { file: "time,flow\n2026-02-02 00:00,2.0\n" },
  chooseRecipe: { body: plainRecipe },
  saveRecipe: { body: { name: "Plant room logger", shared: true } },
  updateRecipe: { body: { version: 1, shared: true } },
  addCertificate: { body: { number: "C-9", issuedOn: "2026-02-01", expanded: 1 } },
  withdrawCertificate: { body: { reason: "Of another instrument" } },
  createInstallation: { body: { startsAt: "2026-02-02T08:00:00Z" } },
  tryInstallation: { body: { startsAt: "2026-02-02T08:00:00Z" } },
  withdrawInstallation: { body: { reason: "On another point" } },
  tryMeterComparison: { body: meterComparisonBody },
  createMeterComparison: { body: meterComparisonBody },
  withdrawMeterComparison: { body: { reason: "Reads of another meter" } },
  chooseRepairs: { body: { overlap: "useThis" } },
};
