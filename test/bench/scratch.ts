import { connectDatabase } from "@server/database/connect";
import { migrate } from "@server/database/migrate";
import { inTransaction } from "@server/database/transaction";
import { storeBlocks } from "@server/readings/store-blocks";
import { recalculateEnergy } from "@server/readings/recalculate-energy";
import { loadSegments } from "@server/readings/load-segments";
import { loadIntervals, replaceIntervals } from "@server/readings/interval-rows";
import { encodeBlock } from "@server/readings/block-codec";
import { sliceRows } from "@server/readings/stored-rows";
import { calculateEnergy } from "@server/readings/calculate-energy";
import { loadEnergySettings } from "@server/readings/energy-settings";
import { localDaysBetween } from "@shared/domain/time/local-calendar";
async function main() {
  const admin = connectDatabase("mariadb://root@127.0.0.1:33300/mysql");
  await admin.query("DROP DATABASE IF EXISTS scratch");
  await admin.query("CREATE DATABASE scratch");
  const database = connectDatabase("mariadb://root@127.0.0.1:33300/scratch");
  await migrate(database);
  await database.query("SET foreign_key_checks=0");
  await database.query("INSERT INTO organisation (id,name,created_at) VALUES (1,'o',NOW(3))");
  await database.query(
    "INSERT INTO site (id,organisation_id,name,zone,currency,created_at) VALUES (1,1,'s','Europe/London','GBP',NOW(3))",
  );
  await database.query(
    "INSERT INTO `loop` (id,organisation_id,site_id,tag,name,service,created_at) VALUES (1,1,1,'t','n','chilled',NOW(3))",
  );
  await database.query(
    "INSERT INTO metering_point (id,organisation_id,loop_id,code,name,role,meter_side,created_at) VALUES (1,1,1,'c','n','main','return',NOW(3))",
  );
  await database.query(
    "INSERT INTO log_import (id,organisation_id,point_id,state,repair,created_by_name,created_at) VALUES (1,1,1,'imported','{}','x',NOW(3))",
  );
  await database.query(
    "INSERT INTO log_file (id,organisation_id,import_id,point_id,name,sha256,byte_length,uploaded_at,precedence,series_kind,nominal_step_ms) VALUES (1,1,1,1,'n','x',1,NOW(3),1,'instantaneous',60000)",
  );
  const n = 525600;
  let state = 7;
  const noise = () => (state = (state * 48271) % 2147483647) / 2147483647 - 0.5;
  const round = (v: number) => Math.round(v * 100) / 100;
  const shape = (i: number) => Math.sin((i / 1440) * 2 * Math.PI);
  const col = (f: (i: number) => number) => Float64Array.from({ length: n }, (_, i) => round(f(i)));
  const rows = {
    instantMs: Float64Array.from({ length: n }, (_, i) => Date.UTC(2025, 0, 1) + i * 60000),
    flow: { unit: "m3/h" as const, values: col((i) => 28 + 8 * shape(i) + noise()) },
    supply: { unit: "degC" as const, values: col(() => 6 + 0.3 * noise()) },
    return: { unit: "degC" as const, values: col((i) => 12 + shape(i) + 0.3 * noise()) },
    signal: null,
    quality: new Uint8Array(n),
  };
  for (let run = 0; run < 3; run++) {
    let t = performance.now();
    let c = process.cpuUsage();
    const lap = (name: string) => {
      const now = performance.now();
      const d = process.cpuUsage(c);
      console.log(name, Math.round(now - t), "cpu", Math.round((d.user + d.system) / 1000));
      t = now;
      c = process.cpuUsage();
    };
    let bytes = 0;
    for (let d = 0; d < 365; d++)
      bytes += encodeBlock(sliceRows(rows, d * 1440, d * 1440 + 1440)).length;
    lap("encode only " + bytes / n);
    await inTransaction(database, async (transaction) => {
      await storeBlocks(transaction, { organisationId: "1", pointId: "1", logFileId: "1" }, rows);
      lap("storeBlocks");
      await recalculateEnergy(database, transaction, "1", {
        startMs: rows.instantMs[0]!,
        endMs: rows.instantMs[n - 1]!,
      });
      lap("recalculate");
    });
    lap("commit");
    const segments = await loadSegments(database, "1", 0, Date.UTC(2030, 0, 1));
    lap("loadSegments");
    const settings = await loadEnergySettings(database, "1");
    const days = localDaysBetween(
      { startMs: rows.instantMs[0]!, endMs: rows.instantMs[n - 1]! },
      "Europe/London",
    );
    lap("days");
    const energy = calculateEnergy(segments, settings, days);
    lap("calculate");
    await inTransaction(database, async (transaction) => {
      await replaceIntervals(
        database,
        transaction,
        "1",
        { fromMs: 0, toMs: Date.UTC(2030, 0, 1) },
        energy!.intervals,
      );
    });
    lap("replaceIntervals");
    const iv = await loadIntervals(database, "1", 0, Date.UTC(2030, 0, 1));
    lap("loadIntervals " + iv.startMs.length);
  }
  await database.close();
  await admin.close();
}
void main();
