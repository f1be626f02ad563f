import type { CanvasKit } from "canvaskit-wasm";
import { version } from "canvaskit-wasm/package.json";
import { LoadSkiaWeb } from "@shopify/react-native-skia/lib/module/web/LoadSkiaWeb";

/** Where Skia's web part leaves its engine. */
interface SkiaHome {
  CanvasKit?: CanvasKit;
}

/** The name carries the version, so that the file may be kept by the browser for good. */
export const canvasKitPath = `/canvaskit-${version}.wasm`;

/**
 * Loads CanvasKit, which must stand in the global scope before any Skia module is evaluated.
 * Without WebGL 2 (locked-down browsers, no graphics processor) it draws through CanvasKit's own
 * software surface instead.
 */
export async function loadSkia(): Promise<void> {
  await LoadSkiaWeb({ locateFile: () => canvasKitPath });
  const { CanvasKit: engine } = globalThis as SkiaHome;
  if (!engine) throw new Error("CanvasKit loaded without its engine");
  const probe = document.createElement("canvas").getContext("webgl2");
  if (probe) {
    probe.getExtension("WEBGL_lose_context")?.loseContext();
    return;
  }
  engine.MakeWebGLCanvasSurface = (canvas) => {
    const target = typeof canvas === "string" ? document.getElementById(canvas) : canvas;
    if (!(target instanceof HTMLCanvasElement)) return null;
    // Claim 2d first: Skia's view asks for WebGL next, and the first kind asked for wins.
    target.getContext("2d");
    return engine.MakeSWCanvasSurface(target);
  };
}
