import type { z } from "zod";
import type { saveLoopPump } from "@shared/contracts/shape";
import { inTransaction } from "@server/database/transaction";
import { Invalid, type FieldError } from "@server/http/errors";
import { Loop } from "@server/models/loop";
import { LoopPump } from "@server/models/loop-pump";
import { changesOf, recordPlaceEvent, type Acting } from "./acting";

type PumpBody = z.output<(typeof saveLoopPump)["body"]>;

function requireWholeCurve(body: PumpBody): void {
  const errors: FieldError[] = [];
  const need = (name: keyof PumpBody, code: string, message: string) =>
    errors.push({ pointer: `/body/${name}`, code, message });
  const curve = ["designHeadM", "designFlowM3PerHour", "efficiency"] as const;
  if (curve.some((name) => body[name] !== null))
    for (const name of curve)
      if (body[name] === null)
        need(name, "incomplete-curve", "Head, flow and efficiency at design go together.");
  if (body.controlledHead && body.designHeadM !== null && body.staticHeadM === null)
    need("staticHeadM", "needs-static-head", "Say how much of the head stays at no flow.");
  if (!body.controlledHead && body.staticHeadM !== null)
    need("staticHeadM", "no-static-head", "Leave it out where no head stays at no flow.");
  if (body.staticHeadM !== null && body.designHeadM !== null && body.staticHeadM > body.designHeadM)
    need("staticHeadM", "above-design-head", "Cannot be above the head at design flow.");
  if (errors.length > 0) throw new Invalid(errors);
}

/** Sets what is known of a loop's pump. Energy does not hang on it, so nothing is recalculated. */
export async function savePump(acting: Acting, loopId: string, body: PumpBody): Promise<LoopPump> {
  requireWholeCurve(body);
  return inTransaction(acting.database, async (transaction) => {
    // Locked, so that two who save at once do not both add a pump.
    const lock = transaction.LOCK.UPDATE;
    await acting.scope.get(Loop, loopId, "loop", { transaction, lock });
    const found = await acting.scope.find(LoopPump, { where: { loopId }, transaction });
    const { organisationId } = acting.scope;
    const pump = found ?? LoopPump.build({ organisationId, loopId, ...body });
    const changes = changesOf<object>(found?.get() ?? {}, body);
    await pump.set(body).save({ transaction });
    const place = { kind: "loop", id: loopId } as const;
    await recordPlaceEvent(acting, place, "updated", { pump: changes }, transaction);
    return pump.reload({ transaction });
  });
}

/** Forgets a loop's pump; nothing happens where none is known. */
export async function removePump(acting: Acting, loopId: string): Promise<void> {
  await inTransaction(acting.database, async (transaction) => {
    await acting.scope.get(Loop, loopId, "loop", { transaction });
    const pump = await acting.scope.find(LoopPump, { where: { loopId }, transaction });
    if (pump === null) return;
    await pump.destroy({ transaction });
    const place = { kind: "loop", id: loopId } as const;
    await recordPlaceEvent(acting, place, "updated", { pump: "removed" }, transaction);
  });
}
