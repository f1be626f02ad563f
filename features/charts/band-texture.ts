import { Skia } from "@shopify/react-native-skia";

import type { Direction } from "./plot-picture";

/*
 * The fill between supply and return says its direction without colour: level lines for cooling,
 * rising lines for heating. Spacing and strength as the frame's key draws them.
 */
const source = `
uniform float4 tint;
uniform float4 ruling;
uniform float rising;
half4 main(float2 at) {
  float level = abs(mod(at.y, 5.0) - 2.5);
  float slope = abs(mod(at.x + at.y, 8.0) - 4.0) * 0.7071;
  float away = mix(level, slope, rising);
  float ink = (1.0 - smoothstep(0.0, 0.8, away)) * mix(0.32, 0.36, rising);
  return half4(mix(tint, ruling, ink));
}`;

const effect = Skia.RuntimeEffect.Make(source);

/** Null where the engine cannot compile it; the fill is then plain, and the key still names it. */
export const bandTexture = effect;

export function textureUniforms(direction: Direction, fill: string, ruling: string) {
  const rgba = (colour: string) => Array.from(Skia.Color(colour));
  return { tint: rgba(fill), ruling: rgba(ruling), rising: direction === "heating" ? 1 : 0 };
}
