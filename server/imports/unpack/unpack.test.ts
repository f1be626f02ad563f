import { mkdtemp, readdir, readFile, rm, writeFile } from "node:fs/promises";
import os from "node:os";
import path from "node:path";
import { gzipSync } from "node:zlib";
import { Random } from "@test/generators/random";
import { STYLE, workbookOf, zipOf } from "@test/generators/archives";
import { UNPACK_LIMITS } from "@shared/domain/log-files/containers";
import { FolderFileStore } from "@server/files/folder-file-store";
import { unpack } from "./unpack";
import { UnpackBudget } from "./unpack-budget";
import { UnpackRefused } from "./unpack-refused";

let folder: string;
let store: FolderFileStore;

beforeEach(async () => {
  folder = await mkdtemp(path.join(os.tmpdir(), "loopwright-unpack-"));
  store = new FolderFileStore(folder);
});
afterEach(() => rm(folder, { recursive: true, force: true }));

const LOG = "Time;Flow m³/h\n2026-05-18 10:00;6,70\n2026-05-18 10:01;6,71\n";

async function open(bytes: Buffer, name: string, checkpoint: () => void = () => undefined) {
  const file = path.join(folder, "upload");
  await writeFile(file, bytes);
  const unpacking = {
    stage: (content: Parameters<typeof store.stage>[0]) => store.stage(content),
    checkpoint,
    onMember: () => undefined,
  };
  return unpack({ path: file, name, byteLength: bytes.length }, unpacking);
}

/** Texts by name, with the notes. */
async function texts(bytes: Buffer, name: string) {
  const { members, notes, kind } = await open(bytes, name);
  const found: Record<string, string> = {};
  for (const member of members) {
    await member.staged.keep();
    const place = await store.localPath(member.staged.sha256);
    found[member.name] = await readFile(place, "utf8");
  }
  return { texts: found, notes, kind };
}

/** Code and place of the refusal; nothing may be left in the store. */
async function refusal(bytes: Buffer, name: string): Promise<string> {
  try {
    const { members } = await open(bytes, name);
    for (const { staged } of members) await staged.discard();
    return "unpacked";
  } catch (error) {
    if (!(error instanceof UnpackRefused)) throw error;
    const incoming = path.join(folder, "files", "incoming");
    expect(await readdir(incoming).catch(() => [])).toEqual([]);
    const { code, cell } = error.unreadable;
    return `${code} ${cell ?? ""}`.trim();
  }
}

describe("a workbook", () => {
  it("becomes a text table a sheet, with dates by their style, numbers with their digits, and errors as written", async () => {
    const bytes = await workbookOf({
      sheets: {
        Readings: {
          rows: [
            ["Time", "Flow m³/h", "Supply °C", "OK", "Note"],
            [
              { raw: "46160.416666666664", style: STYLE.dateTime },
              { raw: "6.7000000000000002", style: STYLE.twoDecimals },
              { raw: "0.1234567890123456" },
              { raw: "1", type: "b" },
              'said "low"\nand\tlater',
            ],
            [
              { raw: "46160.417361111111", style: STYLE.dateTime },
              { raw: "#N/A", type: "e" },
              { raw: "12.8", formula: "C2*2" },
              { raw: "", formula: "A1" },
              null,
            ],
          ],
        },
      },
    });
    const { texts: found, notes, kind } = await texts(bytes, "July.xlsx");
    expect(kind).toBe("xlsx");
    expect(found).toEqual({
      "July.xlsx – Readings": [
        "Time\tFlow m³/h\tSupply °C\tOK\tNote",
        '2026-05-18T10:00:00\t6.7\t0.1234567890123456\tTRUE\t"said ""low"" and later"',
        "2026-05-18T10:01:00\t#N/A\t12.8",
        "",
      ].join("\n"),
    });
    expect(notes).toEqual({
      leftOut: [],
      formulasWithoutValue: 1,
      nameMisleads: false,
      countsFrom1904: false,
    });
  });

  it("keeps a formula written as text the text it is, and no formula's source reaches the log", async () => {
    const bytes = await workbookOf({
      sheets: {
        A: {
          rows: [
            ["Time", "Flow", "Note"],
            ["2026-05-18 10:00", 6.7, '=HYPERLINK("http://example.org";"x")'],
            ["2026-05-18 10:01", 6.8, { raw: "7", formula: 'HYPERLINK("http://example.org")' }],
          ],
        },
      },
    });
    const text = Object.values((await texts(bytes, "a.xlsx")).texts)[0];
    expect(text).toContain('\t"=HYPERLINK(""http://example.org"";""x"")"\n');
    expect(text).toContain("10:01\t6.8\t7\n");
  });

  it("keeps row and column numbers where rows and cells are missing", async () => {
    const bytes = await workbookOf({
      sheets: {
        A: {
          rows: [
            [null, "Time", null, "Flow"],
            [null, "2026-05-18 10:00", null, 6.7],
            [null, "2026-05-18 10:01", null, 6.8],
          ],
          rowNumbers: [3, 4, 9],
        },
      },
      sharedStrings: false,
    });
    const { texts: found } = await texts(bytes, "gaps.xlsx");
    expect(Object.values(found)).toEqual([
      "\n\n\tTime\t\tFlow\n\t2026-05-18 10:00\t\t6.7\n\n\n\n\n\t2026-05-18 10:01\t\t6.8\n",
    ]);
  });

  it("counts days from 1904 where it says so, and says so", async () => {
    const bytes = await workbookOf({
      date1904: true,
      sheets: {
        A: {
          rows: [
            ["Time", "Flow"],
            [{ raw: "44391.5", style: STYLE.dateTime }, 6.7],
          ],
        },
      },
    });
    const { texts: found, notes } = await texts(bytes, "mac.xlsx");
    expect(found["mac.xlsx – A"]).toContain("2025-07-15T12:00:00\t6.7");
    expect(notes.countsFrom1904).toBe(true);
  });

  it("gives every sheet with a log; hidden ones and those without times are left out by name", async () => {
    const rows = [
      ["Time", "Flow"],
      ["2026-05-18 10:00", 6.7],
      ["2026-05-18 10:01", 6.8],
    ];
    const bytes = await workbookOf({
      sheets: {
        Info: {
          rows: [
            ["Site", "Hall"],
            ["Serial", "50417"],
            ["Bore", 82.5],
          ],
        },
        Flow: { rows },
        Old: { rows, hidden: true },
        Temperature: { rows: [...rows, ["2026-05-18 10:02", 6.9]] },
      },
    });
    const { texts: found, notes } = await texts(bytes, "visit.xlsx");
    expect(Object.keys(found)).toEqual(["visit.xlsx – Flow", "visit.xlsx – Temperature"]);
    expect(notes.leftOut).toEqual([
      { name: "visit.xlsx – Old", because: "hiddenSheet" },
      { name: "visit.xlsx – Info", because: "noLog" },
    ]);
  });

  it("is refused when its XML declares entities, nests without end, or holds a text without end", async () => {
    const sheets = { A: { rows: [["Time", "Flow"]] } };
    const laughs = `<?xml version="1.0"?><!DOCTYPE lolz [<!ENTITY a "ha"><!ENTITY b "&a;&a;&a;&a;">]><worksheet><sheetData><row r="1"><c r="A1" t="str"><v>&b;</v></c></row></sheetData></worksheet>`;
    const sheet = "xl/worksheets/sheet1.xml";
    const withSheet = (xml: Buffer | string) => workbookOf({ sheets, parts: { [sheet]: xml } });
    expect(await refusal(await withSheet(laughs), "a.xlsx")).toBe("workbookUnsafe A");
    const entity = laughs.replace(/<!DOCTYPE.*]>/, "");
    expect(await refusal(await withSheet(entity), "a.xlsx")).toBe("archiveBroken A");
    expect(await refusal(await withSheet("<a>".repeat(200)), "a.xlsx")).toBe("workbookUnsafe A");
    const noise = Buffer.alloc(3 << 20, "0123456789abcdefghij klmnopqrstuvw");
    const text = Buffer.concat([Buffer.from("<worksheet><v>"), noise]);
    // Dense as it is, it would be stopped for that: noise of ours is not, see the ratio.
    expect(await refusal(await withSheet(text), "a.xlsx")).toMatch(
      /^(workbookUnsafe|archiveTooDense)/,
    );
    expect(await refusal(await withSheet("<worksheet><sheetData>"), "a.xlsx")).toBe(
      "archiveBroken A",
    );
  });

  it("is refused with rows out of order, and columns no sheet has", async () => {
    const plan = (rowNumbers: number[]) =>
      workbookOf({ sheets: { A: { rows: [["a"], ["b"]], rowNumbers } } });
    expect(await refusal(await plan([5, 4]), "a.xlsx")).toBe("archiveBroken A");
    expect(await refusal(await plan([1, 2_000_000]), "a.xlsx")).toBe("archiveBroken A");
  });

  it("without rows, of another kind, or locked says so", async () => {
    expect(await refusal(await workbookOf({ sheets: { A: { rows: [] } } }), "a.xlsx")).toBe(
      "workbookEmpty",
    );
    const open = await zipOf({ mimetype: "x", "content.xml": "<x/>" });
    expect(await refusal(open, "a.xlsx")).toBe("otherSpreadsheet a.xlsx");
  });
});

describe("an archive", () => {
  it("gives its texts byte for byte, whatever the name says it is; what is no log is named", async () => {
    const bytes = await zipOf({
      "visit/flow.csv": LOG,
      "visit/read me.txt": "Pump was off\nuntil noon\n",
      "visit/photo.jpg": Buffer.from([0xff, 0xd8, 0xff]),
      "__MACOSX/visit/._flow.csv": "x",
      "visit/second.csv": LOG.replace("6,71", "6,72"),
      "visit/a/log.csv": LOG.replace("6,71", "6,73"),
      "visit/b/log.csv": LOG.replace("6,71", "6,74"),
    });
    const { texts: found, notes, kind } = await texts(bytes, "all.csv");
    expect(kind).toBe("zip");
    expect(found).toEqual({
      "flow.csv": LOG,
      "second.csv": LOG.replace("6,71", "6,72"),
      "visit/a/log.csv": LOG.replace("6,71", "6,73"),
      "visit/b/log.csv": LOG.replace("6,71", "6,74"),
    });
    expect(notes).toMatchObject({
      nameMisleads: true,
      leftOut: [
        { name: "visit/photo.jpg", because: "notText" },
        { name: "read me.txt", because: "noLog" },
      ],
    });
  });

  it("keeps the one text without times, so that it says why it cannot be read", async () => {
    const bytes = await zipOf({ "a.csv": "only words\nand more\nwords\n" });
    expect(Object.keys((await texts(bytes, "a.zip")).texts)).toEqual(["a.csv"]);
  });

  it("is not unpacked when it is a bomb, by its ratio, its size or its number of parts", async () => {
    const dense = Buffer.alloc(8 << 20);
    expect(await refusal(await zipOf({ "zeros.csv": dense }), "a.zip")).toBe(
      "archiveTooDense zeros.csv",
    );
    expect(await refusal(gzipSync(dense), "zeros.csv.gz")).toBe("archiveTooDense zeros.csv.gz");
    const many = Object.fromEntries(Array.from({ length: 101 }, (_, i) => [`${i}.csv`, LOG]));
    expect(await refusal(await zipOf(many), "a.zip")).toBe("archiveTooManyEntries 101");
    const thousands = Object.fromEntries(
      Array.from({ length: 10_000 }, (_, i) => [`${i}.csv`, ""]),
    );
    expect(await refusal(await zipOf(thousands, false), "a.zip")).toBe(
      "archiveTooManyEntries 10000",
    );
  });

  it("is stopped at its bounds while it comes out, and nothing is held of what went by", async () => {
    const limits = { ...UNPACK_LIMITS, memberBytes: 1 << 24, totalBytes: 3 << 23 };
    const budget = new UnpackBudget(() => undefined, limits);
    const chunk = Buffer.alloc(1 << 16);
    async function* chunks(count: number) {
      for (let i = 0; i < count; i++) yield chunk;
    }
    const run = async (name: string, count: number, packed: number) => {
      let bytes = 0;
      for await (const piece of budget.bounded(chunks(count), name, () => packed))
        bytes += piece.length;
      return bytes;
    };
    expect(await run("fits", 256, 1 << 22)).toBe(1 << 24);
    await expect(run("all", 200, 1 << 22)).rejects.toThrow("archiveTooLarge: all");
    const fresh = new UnpackBudget(() => undefined, limits);
    const member = fresh.bounded(chunks(300), "member", () => 1 << 22);
    await expect(
      (async () => {
        for await (const piece of member) expect(piece).toBe(chunk);
      })(),
    ).rejects.toThrow("archiveTooLarge: member");
  });

  it("opens no archive within an archive", async () => {
    const inner = await zipOf({ "flow.csv": LOG });
    expect(await refusal(await zipOf({ "inner.zip": inner }), "a.zip")).toBe(
      "archiveNested inner.zip",
    );
    expect(await refusal(gzipSync(gzipSync(LOG)), "a.csv.gz")).toBe("archiveNested a.csv");
    expect(await refusal(gzipSync(inner), "a.csv.gz")).toBe("archiveNested a.csv");
  });

  it("is refused with a name that points outside, or a locked part", async () => {
    const bytes = await zipOf({ "aa/bb/flow.csv": LOG });
    const outside = Buffer.from(bytes.toString("latin1").replaceAll("aa/bb/", "../../"), "latin1");
    expect(await refusal(outside, "a.zip")).toBe("archiveUnsafeName ../../flow.csv");
    const locked = Buffer.from(bytes);
    // The flag of the directory's entry, 8 bytes after its signature (APPNOTE.TXT 4.3.12).
    const entry = locked.indexOf(Buffer.from([0x50, 0x4b, 1, 2]));
    locked[entry + 8] = (locked[entry + 8] as number) | 1;
    expect(await refusal(locked, "a.zip")).toBe("archiveEncrypted aa/bb/flow.csv");
  });

  it("that is cut short or damaged anywhere ends in a plain answer", async () => {
    const good = await zipOf({ "flow.csv": LOG.repeat(50), "second.csv": LOG });
    const packed = gzipSync(LOG.repeat(50));
    expect(await refusal(good.subarray(0, good.length / 2), "a.zip")).toBe("archiveBroken");
    expect(await refusal(packed.subarray(0, packed.length / 2), "a.csv.gz")).toBe(
      "archiveBroken a.csv.gz",
    );
    const random = new Random(5);
    for (let i = 0; i < 60; i++) {
      const bytes = Buffer.from(i % 2 === 0 ? good : packed);
      for (let k = 0; k < 3; k++) bytes[random.whole(4, bytes.length - 1)] = random.whole(0, 255);
      expect(await refusal(bytes, "damaged.zip")).toMatch(/^[a-zA-Z]+/);
    }
  });

  it("whose text was changed within does not pass its checksum", async () => {
    const bytes = await zipOf({ "flow.csv": LOG });
    const stored = Buffer.from(bytes);
    const at = stored.indexOf(Buffer.from([0x50, 0x4b, 1, 2]));
    stored[at + 16] = (stored[at + 16] as number) ^ 0xff;
    expect(await refusal(stored, "a.zip")).toBe("archiveBroken flow.csv");
  });

  it("stops in the midst of a member when the job is no longer wanted", async () => {
    class Stop extends Error {}
    let asked = 0;
    const bytes = await zipOf({ "flow.csv": LOG.repeat(200_000).slice(0, 1 << 20) });
    await expect(
      open(bytes, "a.zip", () => {
        if (++asked === 2) throw new Stop();
      }),
    ).rejects.toThrow(Stop);
    expect(await readdir(path.join(folder, "files", "incoming"))).toEqual([]);
  });
});
