import { nearestNominalSizeDn, pipeLabel, resolvePipe } from "./resolve-pipe";

test("a size of a table brings its printed dimensions", () => {
  // ASME B36.10M, NPS 4 schedule 40: 114.3, 6.02, 102.26 mm.
  const choice = { kind: "table", tableId: "asme-b36.10m-40", dn: 100 } as const;
  const pipe = resolvePipe(choice);
  expect(pipe).toEqual({
    ok: true,
    dimensions: {
      outsideDiameterMm: 114.3,
      wallMm: 6.02,
      liningMm: 0,
      insideDiameterMm: 102.26,
      material: "carbon steel",
    },
  });
  expect(pipe.ok && pipeLabel(choice, pipe.dimensions)).toBe("DN 100, carbon steel");
});

test("a lined iron pipe loses its lining twice", () => {
  const pipe = resolvePipe({ kind: "table", tableId: "en-545-k9", dn: 100 });
  expect(pipe.ok && pipe.dimensions.insideDiameterMm).toBe(98);
});

test("what is wrong with a pipe is named by its field", () => {
  const measured = { kind: "measured", outsideDiameterMm: 50, material: null } as const;
  expect(resolvePipe({ ...measured, wallMm: 25, liningMm: 0 })).toMatchObject({ field: "wallMm" });
  expect(resolvePipe({ ...measured, wallMm: 20, liningMm: 6 })).toMatchObject({
    code: "noBoreLeft",
    field: "liningMm",
  });
  expect(resolvePipe({ kind: "table", tableId: "none", dn: 100 })).toMatchObject({
    code: "noSuchTable",
  });
  expect(resolvePipe({ kind: "table", tableId: "asme-b36.10m-40", dn: 101 })).toMatchObject({
    code: "noSuchSize",
  });
});

test("a measured outside diameter is drawn like the nearest nominal size", () => {
  expect(nearestNominalSizeDn(114)).toBe(100);
  expect(nearestNominalSizeDn(89.4)).toBe(80);
});
