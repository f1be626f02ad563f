import type { z } from "zod";
import type { proposeFill as proposal } from "@shared/contracts/corrections";
import { energyOf, type FillProblem } from "@shared/domain/energy/fills/fill";
import { INTERVAL_MS } from "@shared/domain/energy/interval-energy";
import { DAY_MS, HOUR_MS, type Interval } from "@shared/domain/time/interval";
import { inTransaction } from "@server/database/transaction";
import type { Context } from "@server/http/context";
import { Conflict, Denied, Invalid } from "@server/http/errors";
import { EnergyFill } from "@server/models/energy-fill";
import { MeteringPoint } from "@server/models/metering-point";
import { can } from "@server/policies/can";
import { loadEnergyPoint } from "@server/queries/energy/energy-point";
import { workOutFill } from "@server/queries/fills/work-out-fill";
import { isFilled, storeFillQuarters } from "@server/readings/energy-fills";
import type { Acting } from "./acting";
import { recordAudit } from "./record-audit";

type Proposal = z.output<(typeof proposal)["body"]>;
type Filling = Acting & Pick<Context, "clock">;

/** Longer gaps are filled in pieces: the answer comes in the request. */
const longestMs = 92 * DAY_MS;

/**
 * Works out what a gap may have held and keeps it as a proposal, apart from what was measured.
 * @throws Invalid (422) where the method gives nothing; Conflict (409) where something is filled there.
 */
export async function proposeFill(
  acting: Filling,
  pointId: string,
  { from, to, method, otherPointId, reason }: Proposal,
): Promise<EnergyFill> {
  const { scope, database, clock, actor } = acting;
  const energyPoint = await loadEnergyPoint(acting, pointId);
  if (!energyPoint.settings.fluid.ok)
    throw new Conflict(
      "energy-blocked",
      "This point's readings give no energy, so a gap of it cannot be filled.",
      "See the loop page for what is missing.",
    );
  if (energyPoint.readings.rowCount === 0)
    throw new Conflict(
      "no-readings",
      "This metering point holds no readings, so there is no gap between them.",
      "Import its log first.",
    );
  const other = await otherPointOf(acting, pointId, method, otherPointId);
  const { outcome, range } = await workOutFill(database, energyPoint, {
    range: rangeOf(from, to, clock.now()),
    method,
    otherPointId: other,
    nowMs: clock.now(),
  });
  if (!outcome.ok) throw refusal(outcome.problem);
  const { quarters, uncertaintyPercent, days } = outcome.fill;
  const sum = (of: (quarter: (typeof quarters)[number]) => number) =>
    quarters.reduce((total, quarter) => total + of(quarter), 0);
  return inTransaction(database, async (transaction) => {
    // Locked, so that two proposals for one gap cannot pass each other.
    const lock = transaction.LOCK.UPDATE;
    await scope.get(MeteringPoint, pointId, "metering point", { transaction, lock });
    if (await isFilled(database, pointId, range, transaction))
      throw new Conflict(
        "fill-overlaps",
        "Some of this time has a fill already.",
        "Withdraw that one first, or choose a span beside it.",
      );
    const row = await scope.create(
      EnergyFill,
      {
        pointId,
        fromMs: range.startMs,
        toMs: range.endMs,
        method,
        otherPointId: other,
        reason,
        heatingKwh: sum(({ heatingKwh }) => heatingKwh),
        coolingKwh: sum(({ coolingKwh }) => coolingKwh),
        volumeM3: quarters.some(({ volumeM3 }) => volumeM3 === null)
          ? null
          : sum(({ volumeM3 }) => volumeM3 ?? 0),
        filledS: sum(({ filledS }) => filledS),
        uncertaintyPercent,
        days,
        state: "proposed",
        createdAt: clock.date(),
        createdByAccountId: actor.accountId,
        createdByName: actor.accountName,
      },
      { transaction },
    );
    await storeFillQuarters(transaction, row.id, quarters);
    const details = { pointId, method, from, to, reason, energyKwh: energyOf(quarters) };
    const subject = { kind: "fill", id: row.id };
    await recordAudit(acting, { kind: "fill-proposed", subject, details }, transaction);
    return row.reload({ transaction });
  });
}

export function approveFill(acting: Filling, id: string): Promise<EnergyFill> {
  return change(acting, id, "fill-approved", (row) => {
    if (row.state === "approved") throw alreadyIs("approved");
    if (row.state === "withdrawn") throw alreadyIs("withdrawn");
    row.set({
      state: "approved",
      approvedAt: acting.clock.date(),
      approvedByName: acting.actor.accountName,
    });
  });
}

/** Takes a fill away. One that was approved goes only by somebody who could approve it. */
export function withdrawFill(acting: Filling, id: string): Promise<EnergyFill> {
  return change(acting, id, "fill-withdrawn", (row) => {
    if (row.state === "withdrawn") throw alreadyIs("withdrawn");
    if (row.state === "approved" && !can(acting.actor).approveFills)
      throw new Denied(
        "This fill is approved.",
        "Ask an engineer or an administrator to withdraw it.",
        "fill-approved",
      );
    row.set({
      state: "withdrawn",
      withdrawnAt: acting.clock.date(),
      withdrawnByName: acting.actor.accountName,
    });
  });
}

async function change(
  acting: Filling,
  id: string,
  kind: string,
  work: (row: EnergyFill) => void,
): Promise<EnergyFill> {
  return inTransaction(acting.database, async (transaction) => {
    const row = await acting.scope.get(EnergyFill, id, "fill", {
      transaction,
      lock: transaction.LOCK.UPDATE,
    });
    work(row);
    await row.save({ transaction });
    const details = { pointId: row.pointId, method: row.method };
    await recordAudit(acting, { kind, subject: { kind: "fill", id }, details }, transaction);
    return row;
  });
}

async function otherPointOf(
  { scope }: Acting,
  pointId: string,
  method: Proposal["method"],
  id: string | undefined,
): Promise<string | null> {
  if (method !== "otherPoint") return null;
  if (id === undefined || id === pointId)
    throw Invalid.field("otherPointId", "choose-another", "Choose the other metering point.");
  const other = await scope.find(MeteringPoint, { where: { id } });
  if (other === null)
    throw Invalid.field("otherPointId", "no-such-point", "There is no such metering point.");
  return other.id;
}

/** Whole quarter-hours round what was asked, because energy is kept by them; nothing yet to come. */
function rangeOf(from: string, to: string, nowMs: number): Interval {
  const startMs = Math.floor(Date.parse(from) / INTERVAL_MS) * INTERVAL_MS;
  const now = Math.floor(nowMs / INTERVAL_MS) * INTERVAL_MS;
  const endMs = Math.min(Math.ceil(Date.parse(to) / INTERVAL_MS) * INTERVAL_MS, now);
  if (!(startMs < endMs))
    throw Invalid.field("to", "empty-range", "The end must be later than the start, and past.");
  if (endMs - startMs > longestMs)
    throw Invalid.field("to", "range-too-long", "Fill at most 92 days at a time.");
  return { startMs, endMs };
}

function refusal(problem: FillProblem): Invalid {
  const method = (message: string) => Invalid.field("method", problem.code, message);
  switch (problem.code) {
    case "nothing-to-fill":
      return Invalid.field("from", problem.code, "Readings cover all of this time.");
    case "gap-too-long":
      return method(
        `A straight line joins an hour at most; this gap is ${(problem.longestMs / HOUR_MS).toFixed(1)} h long.`,
      );
    case "no-reading-beside":
      return method("There is no reading on both sides of the gap.");
    case "too-few-like-days":
      return method(
        `Three like days are needed; ${problem.found} were measured at these hours before ${problem.date}.`,
      );
    case "too-little-in-common":
      return method(
        `Both points must have measured 24 h together; they did ${problem.hours.toFixed(1)} h.`,
      );
    case "other-point-at-rest":
      return method("The other point moved no heat while this one did, so no ratio can be formed.");
    case "other-point-open":
      return method("The other point has no readings in the gap either.");
  }
}

function alreadyIs(state: "approved" | "withdrawn"): Conflict {
  return new Conflict(
    `fill-${state}`,
    `This fill is ${state} already.`,
    state === "approved"
      ? "Nothing needs to be done."
      : "Propose it anew if it is right after all.",
  );
}
