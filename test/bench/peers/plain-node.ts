import { createReadStream, readFileSync } from "node:fs";
import { DateTime } from "luxon";
import Papa from "papaparse";
import { DataTypes, type ModelStatic, type Model, type Sequelize } from "sequelize";
import { createRowTable } from "./row-table";
import { fullWater } from "./full-water";

const header = {
  time: "timestamp",
  flow: "flow m3/h",
  supply: "supply °C",
  back: "return °C",
} as const;
type CsvRow = Record<(typeof header)[keyof typeof header], string>;

const pressureMPa = 0.501325;

function defineSample(database: Sequelize): ModelStatic<Model> {
  const float = { type: DataTypes.FLOAT, allowNull: false };
  return database.define(
    "plain_sample",
    {
      pointId: { type: DataTypes.INTEGER.UNSIGNED, primaryKey: true, field: "point_id" },
      atS: { type: DataTypes.INTEGER.UNSIGNED, primaryKey: true, field: "at_s" },
      flow: float,
      supply: float,
      back: float,
      powerKw: { ...float, field: "power_kw" },
    },
    { tableName: "plain_sample", timestamps: false },
  );
}

/**
 * The year as one writes it in an afternoon: papaparse into objects, a date library for each row,
 * the whole water formula, `bulkCreate` of a row a sample. Answers the cooling energy, kWh.
 */
export async function plainNodeImport(database: Sequelize, path: string): Promise<number> {
  await createRowTable(database, "plain_sample");
  const Sample = defineSample(database);
  const { data } = Papa.parse<CsvRow>(readFileSync(path, "utf8"), {
    header: true,
    skipEmptyLines: true,
  });
  const samples = data.map((row) => {
    const flow = Number(row[header.flow]);
    const supply = Number(row[header.supply]);
    const back = Number(row[header.back]);
    const at = DateTime.fromSQL(row[header.time], { zone: "utc" });
    const cold = fullWater(supply, pressureMPa);
    const warm = fullWater(back, pressureMPa);
    const { densityKgPerM3 } = fullWater(back, pressureMPa);
    const powerKw =
      ((flow * densityKgPerM3) / 3600) * (warm.enthalpyKjPerKg - cold.enthalpyKjPerKg);
    return { pointId: 1, atS: at.toSeconds(), flow, supply, back, powerKw };
  });
  let coolingKwh = 0;
  for (let row = 1; row < samples.length; row++) {
    const before = samples[row - 1];
    const now = samples[row];
    if (!before || !now) continue;
    coolingKwh += (((before.powerKw + now.powerKw) / 2) * (now.atS - before.atS)) / 3600;
  }
  await database.transaction(async (transaction) => {
    for (let row = 0; row < samples.length; row += 10_000)
      await Sample.bulkCreate(samples.slice(row, row + 10_000), { transaction });
  });
  return coolingKwh;
}

/** A papaparse stream over the file, counting rows and turning nothing into numbers. */
export function papaparseStream(path: string): Promise<number> {
  let rows = 0;
  return new Promise((resolve, reject) => {
    const parser = Papa.parse(Papa.NODE_STREAM_INPUT, {});
    parser.on("data", () => rows++);
    parser.on("end", () => resolve(rows));
    parser.on("error", reject);
    createReadStream(path).pipe(parser);
  });
}

/** The same by papaparse's own chunks, which is its quicker way. */
export function papaparseChunks(path: string): Promise<number> {
  let rows = 0;
  return new Promise((resolve, reject) => {
    Papa.parse<string[]>(createReadStream(path, { encoding: "utf8", highWaterMark: 1 << 20 }), {
      chunk: ({ data }) => {
        rows += data.length;
      },
      complete: () => resolve(rows),
      error: reject,
    });
  });
}
