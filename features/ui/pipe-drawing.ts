import { pipeStrokeByNominalSize } from "./theme";
import type { Service } from "./loop-tag";
import type { Colours } from "./theme";

/** Stroke of a pipe drawing in px from its nominal size in mm; unknown sizes draw as DN 80. */
export function pipeStroke(nominalMm: number | null): number {
  if (nominalMm === null) return 7;
  const steps = pipeStrokeByNominalSize;
  const first = steps[0];
  const last = steps[steps.length - 1];
  if (!first || !last || nominalMm <= first[0]) return first?.[1] ?? 5;
  if (nominalMm >= last[0]) return last[1];
  for (let i = 1; i < steps.length; i++) {
    const [size, px] = steps[i] ?? last;
    const [sizeBefore, pxBefore] = steps[i - 1] ?? first;
    if (nominalMm <= size) {
      return pxBefore + ((px - pxBefore) * (nominalMm - sizeBefore)) / (size - sizeBefore);
    }
  }
  return last[1];
}

/** Wall of a hollow (return) pipe: what is left of its stroke each side of the core. */
export function hollowCore(strokePx: number): number {
  return strokePx >= 10 ? strokePx * 0.7 : Math.max(1.5, strokePx - 3.6);
}

export interface ServiceColours {
  /** Text, tag and supply pipe. */
  readonly main: string;
  /** Return pipe and chart marks. */
  readonly mid: string;
  readonly tint: string;
  readonly faint: string;
}

/** A changeover loop draws as what it is doing; `doing` is null while nobody knows. */
export function serviceColours(
  service: Service,
  colour: Colours,
  doing: "cooling" | "heating" | null = null,
): ServiceColours {
  const heating = service === "heating" || (service === "changeover" && doing === "heating");
  return heating
    ? {
        main: colour.copper,
        mid: colour.copperMid,
        tint: colour.copperTint,
        faint: colour.copperFaint,
      }
    : {
        main: colour.verdigris,
        mid: colour.verdigrisMid,
        tint: colour.verdigrisTint,
        faint: colour.verdigrisFaint,
      };
}

/** The upper (supply) and lower (return) half of a loop in a box, meeting at half height. */
export function loopHalves(
  width: number,
  height: number,
): { readonly supply: string; readonly return: string; readonly whole: string } {
  const left = 10;
  const right = width - 24;
  const top = 14;
  const bottom = height - 14;
  const mid = height / 2;
  const r = 22;
  return {
    supply: `M${left} ${mid}V${top + r}a${r} ${r} 0 0 1 ${r} ${-r}H${right - r}a${r} ${r} 0 0 1 ${r} ${r}V${mid}`,
    return: `M${right} ${mid}V${bottom - r}a${r} ${r} 0 0 1 ${-r} ${r}H${left + r}a${r} ${r} 0 0 1 ${-r} ${-r}V${mid}`,
    whole: closedLoop(left, top, right, bottom, 28),
  };
}

/** A closed rounded loop, starting at the middle of its left side and running clockwise. */
export function closedLoop(
  left: number,
  top: number,
  right: number,
  bottom: number,
  r: number,
): string {
  const mid = (top + bottom) / 2;
  return (
    `M${left} ${mid}V${top + r}a${r} ${r} 0 0 1 ${r} ${-r}H${right - r}a${r} ${r} 0 0 1 ${r} ${r}` +
    `V${bottom - r}a${r} ${r} 0 0 1 ${-r} ${r}H${left + r}a${r} ${r} 0 0 1 ${-r} ${-r}z`
  );
}
