import { render } from "@testing-library/react";

import type { PlotPicture } from "./plot-picture";

/*
 * Real Skia in Node: no graphics processor and no canvas context, so what is checked is that the
 * drawing part loads, compiles its texture, builds its paths and mounts. Everything else of a chart
 * is tested without it.
 */
beforeAll(async () => {
  const { LoadSkiaWeb } = require("@shopify/react-native-skia/lib/module/web/LoadSkiaWeb");
  await LoadSkiaWeb({
    locateFile: () => require.resolve("canvaskit-wasm/bin/full/canvaskit.wasm"),
  });
}, 60_000);

const points = [0, 10, 20, 30, 40].map((x) => ({
  x,
  xValue: x,
  y: x === 20 ? null : 50,
  yValue: x === 20 ? null : 1,
}));
const picture: PlotPicture = {
  width: 40,
  height: 100,
  supply: { cooling: points, heating: [] },
  return: { cooling: points, heating: [] },
  band: { cooling: points.map((point) => ({ ...point, y0: 60 })), heating: [] },
  envelopes: { cooling: [], heating: [] },
  bars: [{ x: 4, y: 80, width: 2, height: 20 }],
};

it("builds one closed shape for each side of a hole", () => {
  const { bandPath, barsPath } = require("./plot-paths");
  const moves = (path: { toSVGString(): string }) => path.toSVGString().match(/M/g)?.length;
  expect(moves(bandPath(picture.band.cooling))).toBe(2);
  expect(barsPath(picture.bars).getBounds()).toMatchObject({ x: 4, y: 80, width: 2, height: 20 });
});

it("compiles the texture that tells cooling from heating", () => {
  const { bandTexture, textureUniforms } = require("./band-texture");
  expect(bandTexture).not.toBeNull();
  expect(textureUniforms("heating", "white", "black").rising).toBe(1);
  expect(textureUniforms("cooling", "white", "black").rising).toBe(0);
});

it("mounts the drawing at its size", () => {
  const { PlotCanvas } = require("./skia-entry");
  const hue = { supply: "teal", return: "teal", fill: "white" };
  const { container } = render(
    <PlotCanvas picture={picture} colours={{ cooling: hue, heating: hue, bars: "grey" }} large />,
  );
  expect(container.querySelector("canvas, div")).not.toBeNull();
});
