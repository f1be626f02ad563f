import { role } from "@shared/contracts/people";
import { signedIn } from "@server/testing/factories";
import { testApp } from "@server/testing/test-app";
import { endpoints } from ".";

const app = testApp();

/*
 * Who may call what, spelled out. Columns: administrator, surveyor, engineer, billing clerk, tenant
 * contact, nobody signed in; ✓ may, – may not. A new endpoint needs a line, and a line an endpoint.
 * What hangs on a record (whose import, last administrator) is tested with its command.
 */
const matrix = `
                          adm sur eng bil ten nobody
  getHealth                ✓   ✓   ✓   ✓   ✓   ✓
  getOpenApi               ✓   ✓   ✓   ✓   ✓   ✓
  signIn                   ✓   ✓   ✓   ✓   ✓   ✓
  signOut                  ✓   ✓   ✓   ✓   ✓   ✓
  requestPasswordReset     ✓   ✓   ✓   ✓   ✓   ✓
  resetPassword            ✓   ✓   ✓   ✓   ✓   ✓
  readInvitation           ✓   ✓   ✓   ✓   ✓   ✓
  acceptInvitation         ✓   ✓   ✓   ✓   ✓   ✓
  getSession               ✓   ✓   ✓   ✓   ✓   –
  signOutEverywhere        ✓   ✓   ✓   ✓   ✓   –
  updateAccount            ✓   ✓   ✓   ✓   ✓   –
  changePassword           ✓   ✓   ✓   ✓   ✓   –
  listMembers              ✓   –   –   –   –   –
  inviteMember             ✓   –   –   –   –   –
  resendInvitation         ✓   –   –   –   –   –
  updateMember             ✓   –   –   –   –   –
  removeMember             ✓   –   –   –   –   –
  listAccessTokens         ✓   –   –   –   –   –
  createAccessToken        ✓   –   –   –   –   –
  revokeAccessToken        ✓   –   –   –   –   –
  listCaughtMail           ✓   –   –   –   –   –
  listSites                ✓   ✓   ✓   ✓   –   –
  createSite               ✓   –   ✓   –   –   –
  getSite                  ✓   ✓   ✓   ✓   –   –
  updateSite               ✓   –   ✓   –   –   –
  removeSite               ✓   –   ✓   –   –   –
  getSiteOverview          ✓   ✓   ✓   ✓   –   –
  listBuildings            ✓   ✓   ✓   ✓   –   –
  createBuilding           ✓   –   ✓   –   –   –
  updateBuilding           ✓   –   ✓   –   –   –
  removeBuilding           ✓   –   ✓   –   –   –
  listLoops                ✓   ✓   ✓   ✓   –   –
  createLoop               ✓   –   ✓   –   –   –
  getLoop                  ✓   ✓   ✓   ✓   –   –
  updateLoop               ✓   –   ✓   –   –   –
  removeLoop               ✓   –   ✓   –   –   –
  listPoints               ✓   ✓   ✓   ✓   –   –
  createPoint              ✓   ✓   ✓   –   –   –
  getPoint                 ✓   ✓   ✓   ✓   –   –
  updatePoint              ✓   ✓   ✓   –   –   –
  removePoint              ✓   ✓   ✓   –   –   –
  listBoreVersions         ✓   ✓   ✓   ✓   –   –
  listPipeTables           ✓   ✓   ✓   ✓   –   –
  listImports              ✓   ✓   ✓   ✓   –   –
  getImport                ✓   ✓   ✓   ✓   –   –
  downloadLogFile          ✓   ✓   ✓   ✓   –   –
  downloadLogText          ✓   ✓   ✓   ✓   –   –
  previewLogRows           ✓   ✓   ✓   ✓   –   –
  createImport             ✓   ✓   ✓   –   –   –
  addImportFile            ✓   ✓   ✓   –   –   –
  removeImportFile         ✓   ✓   ✓   –   –   –
  alsoForPoint             ✓   ✓   ✓   –   –   –
  chooseRecipe             ✓   ✓   ✓   –   –   –
  chooseRepairs            ✓   ✓   ✓   –   –   –
  checkImport              ✓   ✓   ✓   –   –   –
  confirmImport            ✓   ✓   ✓   –   –   –
  cancelImport             ✓   ✓   ✓   –   –   –
  undoImport               ✓   ✓   ✓   –   –   –
  reopenImport             ✓   ✓   ✓   –   –   –
  listRecipes              ✓   ✓   ✓   ✓   –   –
  getRecipe                ✓   ✓   ✓   ✓   –   –
  getRecipeOffer           ✓   ✓   ✓   ✓   –   –
  saveRecipe               ✓   ✓   ✓   –   –   –
  updateRecipe             ✓   ✓   ✓   –   –   –
  deleteRecipe             ✓   ✓   ✓   –   –   –
  applyRecipe              ✓   ✓   ✓   –   –   –
  downloadProblemRows      ✓   ✓   ✓   ✓   –   –
  getImportHistory         ✓   ✓   ✓   ✓   –   –
  listImportPeople         ✓   ✓   ✓   ✓   –   –
  changeImportChoices      ✓   ✓   ✓   –   –   –
  listImportBatches        ✓   ✓   ✓   ✓   –   –
  getImportBatch           ✓   ✓   ✓   ✓   –   –
  downloadBatchReport      ✓   ✓   ✓   ✓   –   –
  createImportBatch        ✓   ✓   ✓   –   –   –
  addBatchFile             ✓   ✓   ✓   –   –   –
  chooseBatchPoint         ✓   ✓   ✓   –   –   –
  removeBatchFile          ✓   ✓   ✓   –   –   –
  confirmImportBatch       ✓   ✓   ✓   –   –   –
  getEnergy                ✓   ✓   ✓   ✓   –   –
  getPointSummary          ✓   ✓   ✓   ✓   –   –
  getSeries                ✓   ✓   ✓   ✓   –   –
  getReadings              ✓   ✓   ✓   ✓   –   –
  downloadIntervals        ✓   ✓   ✓   ✓   –   –
  downloadReadings         ✓   ✓   ✓   ✓   –   –
  listCompanions           ✓   ✓   ✓   ✓   –   –
  getCompanionSeries       ✓   ✓   ✓   ✓   –   –
  getWorkings              ✓   ✓   ✓   ✓   –   –
  downloadWorkingsCsv      ✓   ✓   ✓   ✓   –   –
  downloadWorkingsPdf      ✓   ✓   ✓   ✓   –   –
  getPointShape            ✓   ✓   ✓   ✓   –   –
  downloadDurationCurve    ✓   ✓   ✓   ✓   –   –
  getLoopPump              ✓   ✓   ✓   ✓   –   –
  saveLoopPump             ✓   –   ✓   –   –   –
  removeLoopPump           ✓   –   ✓   –   –   –
  getDayMarks              ✓   ✓   ✓   ✓   –   –
  listInstruments          ✓   ✓   ✓   ✓   –   –
  getInstrument            ✓   ✓   ✓   ✓   –   –
  createInstrument         ✓   ✓   ✓   –   –   –
  updateInstrument         ✓   ✓   ✓   –   –   –
  addCertificate           ✓   ✓   ✓   –   –   –
  withdrawCertificate      ✓   ✓   ✓   –   –   –
  listBathChecks           ✓   ✓   ✓   ✓   –   –
  getBathCheck             ✓   ✓   ✓   ✓   –   –
  createBathCheck          ✓   ✓   ✓   –   –   –
  listInstallations        ✓   ✓   ✓   ✓   –   –
  getInstallation          ✓   ✓   ✓   ✓   –   –
  createInstallation       ✓   ✓   ✓   –   –   –
  tryInstallation          ✓   ✓   ✓   –   –   –
  withdrawInstallation     ✓   ✓   ✓   –   –   –
  listCorrections          ✓   ✓   ✓   ✓   –   –
  getCorrection            ✓   ✓   ✓   ✓   –   –
  proposeCorrection        ✓   ✓   ✓   –   –   –
  applyCorrection          ✓   ✓   ✓   –   –   –
  withdrawCorrection       ✓   ✓   ✓   –   –   –
  listFills                ✓   ✓   ✓   ✓   –   –
  proposeFill              ✓   ✓   ✓   –   –   –
  approveFill              ✓   –   ✓   –   –   –
  withdrawFill             ✓   ✓   ✓   –   –   –
  listMeterComparisons     ✓   ✓   ✓   ✓   –   –
  tryMeterComparison       ✓   ✓   ✓   ✓   –   –
  createMeterComparison    ✓   –   ✓   –   –   –
  getMeterComparison       ✓   ✓   ✓   ✓   –   –
  withdrawMeterComparison  ✓   –   ✓   –   –   –
  downloadMeterComparison  ✓   ✓   ✓   ✓   –   –
  listEnergyResults        ✓   ✓   ✓   ✓   –   –
  getEnergyResult          ✓   ✓   ✓   ✓   –   –
  getToday                 ✓   ✓   ✓   ✓   –   –
`;

const rows = new Map(
  matrix
    .trim()
    .split("\n")
    .slice(1)
    .map((line) => line.trim().split(/\s+/))
    .map(([operationId = "", ...marks]) => [operationId, marks] as const),
);

function isAllowed(operationId: string, column: number): boolean {
  const mark = rows.get(operationId)?.[column];
  if (mark !== "✓" && mark !== "–")
    throw new Error(`no mark for ${operationId} in column ${column}`);
  return mark === "✓";
}

function addressOf(path: string): string {
  return path.replace(/:\w+/g, "999999999");
}

it("has a line for every endpoint and an endpoint for every line", () => {
  const served = endpoints.map(({ contract }) => contract.operationId);
  expect([...rows.keys()].sort()).toEqual([...served].sort());
});

it.each(endpoints.map((endpoint) => [endpoint.contract.operationId, endpoint] as const))(
  "%s answers whom the matrix says and nobody else",
  async (operationId, { contract }) => {
    const address = addressOf(contract.path);
    const { organisationId } = await signedIn(app, { role: "administrator" });
    for (const [column, caller] of role.options.entries()) {
      // Some calls end the caller's session, so everybody comes with a new one.
      const agent = await signedIn(app, { role: caller, organisationId });
      const { status, body } = await agent[contract.method](address);
      // Input is missing on purpose: refused with 422 or 404 is past the policy.
      const refused = status === 403 && body.code === "denied";
      expect([caller, !refused]).toEqual([caller, isAllowed(operationId, column)]);
    }
    const { status, body } = await app.anonymous[contract.method](`/api/v1${address}`);
    const refused = status === 401 && body.code === "not-signed-in";
    expect(["nobody", !refused]).toEqual(["nobody", isAllowed(operationId, role.options.length)]);
  },
);
