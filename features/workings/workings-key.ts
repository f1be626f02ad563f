import { workingsFigure, type WorkingsFigure } from "@shared/contracts/workings";

/**
 * Which figure's workings are open, as the address says it: `energy` alone on a loop's page, and with
 * register, point and range where the page does not say them: `energy~heating~p7~2026-05-14~2026-05-15`.
 */
export interface WorkingsKey {
  readonly figure: WorkingsFigure;
  readonly register?: "heating" | "cooling";
  readonly pointId?: string;
  /** Both ends, as dates or as instants; the end is not part of it. */
  readonly from?: string;
  readonly to?: string;
}

const point = /^p([1-9]\d{0,18})$/;
const edge = /^\d{4}-\d\d-\d\d(T[\d:.]+Z)?$/;

export function writeWorkingsKey({ figure, register, pointId, from, to }: WorkingsKey): string {
  const range = from !== undefined && to !== undefined ? [from, to] : [];
  return [figure, register, pointId && `p${pointId}`, ...range].filter(Boolean).join("~");
}

/** Null where the address asks for no figure there is. */
export function readWorkingsKey(text: string | undefined): WorkingsKey | null {
  const [first, ...rest] = (text ?? "").split("~");
  const figure = workingsFigure.safeParse(first);
  if (!figure.success) return null;
  const register = rest.find((part) => part === "heating" || part === "cooling");
  const pointId = rest.flatMap((part) => point.exec(part)?.[1] ?? [])[0];
  const [from, to] = rest.filter((part) => edge.test(part));
  return {
    figure: figure.data,
    ...(register === undefined ? {} : { register }),
    ...(pointId === undefined ? {} : { pointId }),
    ...(from === undefined || to === undefined ? {} : { from, to }),
  };
}
