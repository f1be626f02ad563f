import type { ImportDetail, ImportFile, ImportSummary } from "@shared/contracts/imports";
import { absolutePressureMPa } from "@shared/domain/fluids/loop-fluid";
import type { FileRecipe } from "@shared/domain/log-files/recipe";
import { pipeLabel } from "@shared/domain/pipes/resolve-pipe";
import { instantText, instantTextOrNull } from "@server/database/conversions";
import type { BoreVersion } from "@server/models/bore-version";
import type { LogFile } from "@server/models/log-file";
import type { LogImport } from "@server/models/log-import";
import type { Actor } from "@server/policies/actor";
import { can } from "@server/policies/can";
import type { SaidByFile } from "./file-facts";
import type { ImportFacts, ImportPlace } from "./import-facts";
import { presentPointSet, presentQuestion } from "./present-question";
import { isCancellable, isEditable, isReopenable } from "./import-states";

function placeOf(row: LogImport, facts: ImportFacts): ImportPlace {
  const place = facts.places.get(row.pointId);
  if (place === undefined) throw new Error(`import ${row.id} belongs to no point`);
  return place;
}

export function presentImport(row: LogImport, facts: ImportFacts, actor: Actor): ImportSummary {
  const place = placeOf(row, facts);
  const job = facts.jobs.get(row.id);
  const { importLogs, undoImport } = can(actor);
  const isUndoing = job?.kind === "undo";
  return {
    id: row.id,
    state: row.state,
    point: { id: place.pointId, code: place.pointCode, name: place.pointName },
    loop: {
      id: place.loopId,
      tag: place.loopTag,
      name: place.loopName,
      service: place.service,
    },
    site: { id: place.siteId, name: place.siteName, zone: place.zone },
    buildingName: place.buildingName,
    fileNames: facts.fileNames.get(row.id) ?? [],
    createdBy: row.createdByName,
    createdAt: instantText(row.createdAt),
    importedAt: instantTextOrNull(row.importedAt),
    rowsStored: row.rowsStored,
    firstInstant: instantTextOrNull(row.firstInstant),
    lastInstant: instantTextOrNull(row.lastInstant),
    failure: row.failure,
    progress: job?.progress ?? null,
    can: {
      edit: importLogs && isEditable(row.state),
      confirm: importLogs && row.state === "ready",
      undo:
        row.state === "imported" &&
        !isUndoing &&
        undoImport({ importedByAccountId: row.createdByAccountId }),
      cancel: importLogs && isCancellable(row.state),
      reopen: importLogs && isReopenable(row.state),
    },
  };
}

/** The bytes of `file` are stored for this point already, through an import that still counts. */
export interface Twin {
  readonly file: LogFile;
  readonly earlier: LogFile;
  readonly importedAt: Date;
}

export function presentRecipe({ meter, ...recipe }: FileRecipe): NonNullable<ImportFile["recipe"]> {
  return {
    ...recipe,
    columns: recipe.columns.map(({ badWords, ...column }) => ({
      ...column,
      ...(badWords && { badWords: [...badWords] }),
    })),
    ...(meter && { meter: { ...meter, exchangedAt: [...meter.exchangedAt] } }),
  };
}

function presentSource(file: LogFile): ImportFile["source"] {
  const { sourceKind, sourceName, sourceSha256, sourceByteLength, unpackNotes: notes } = file;
  if (sourceKind === null || sourceName === null || sourceSha256 === null) return null;
  return {
    kind: sourceKind,
    name: sourceName,
    bytes: sourceByteLength ?? 0,
    sha256: sourceSha256,
    member: file.member,
    leftOut: (notes?.leftOut ?? []).map((part) => ({ ...part })),
    formulasWithoutValue: notes?.formulasWithoutValue ?? 0,
    nameMisleads: notes?.nameMisleads ?? false,
    countsFrom1904: notes?.countsFrom1904 ?? false,
  };
}

function presentFile(
  file: LogFile,
  twins: readonly Twin[],
  alsoFor: ImportFile["alsoFor"],
  said: SaidByFile | undefined,
): ImportFile {
  const twin = twins.find((other) => other.file.id === file.id);
  const { recognition } = file;
  return {
    id: file.id,
    name: file.name,
    bytes: file.byteLength,
    sha256: file.sha256,
    source: presentSource(file),
    uploadedAt: instantText(file.uploadedAt),
    sameAs: twin
      ? {
          importId: twin.earlier.importId,
          name: twin.earlier.name,
          importedAt: instantText(twin.importedAt),
        }
      : null,
    alsoFor,
    unreadable: file.unreadable,
    recognition: recognition && {
      proofs: recognition.proofs.map((proof) => ({ ...proof })),
      firstLines: [...recognition.firstLines],
      sampleRows: recognition.sampleRows.map(({ line, cells }) => ({ line, cells: [...cells] })),
      dataRowCount: recognition.dataRowCount,
      columnCount: recognition.columnCount,
      pointSets: (recognition.pointSets ?? []).map(presentPointSet),
      preamble: recognition.preamble.map((entry) => ({ ...entry })),
    },
    recipe: file.recipe && presentRecipe(file.recipe),
    questions: (file.questions ?? []).map(presentQuestion),
    facts: said?.facts ?? [],
    heldAgainst: said?.installationId ?? null,
  };
}

export function presentImportDetail(
  row: LogImport,
  facts: ImportFacts,
  more: {
    readonly files: readonly LogFile[];
    readonly twins: readonly Twin[];
    readonly alsoFor: ReadonlyMap<string, ImportFile["alsoFor"]>;
    /** What each file says of pipe and kit, held against the record. */
    readonly said: ReadonlyMap<string, SaidByFile>;
    readonly bore: BoreVersion | null;
  },
  actor: Actor,
): ImportDetail {
  const place = placeOf(row, facts);
  const { bore } = more;
  const { pressureMPa, assumed } = absolutePressureMPa(place.gaugePressureMPa);
  const summary = presentImport(row, facts, actor);
  return {
    ...summary,
    // Bytes that are stored already must not count twice: confirming would be refused.
    can: { ...summary.can, confirm: summary.can.confirm && more.twins.length === 0 },
    files: more.files.map((file) =>
      presentFile(file, more.twins, more.alsoFor.get(file.id) ?? [], more.said.get(file.id)),
    ),
    repair: row.repair,
    checks: row.checks,
    pipe: bore && {
      insideDiameterMm: bore.insideDiameterMm,
      label: pipeLabel(bore.pipe, bore),
    },
    meterSide: place.meterSide,
    pressure: { absoluteMPa: pressureMPa, assumed },
  };
}
