import {
  downloadWorkingsCsv,
  downloadWorkingsPdf,
  getWorkings,
  type Workings,
} from "@shared/contracts/workings";
import { localDateOf } from "@shared/domain/time/local-calendar";
import type { Context } from "@server/http/context";
import { FileAnswer } from "@server/http/file-answer";
import { defineEndpoint, type Endpoint, type Input } from "@server/http/define-endpoint";
import { may } from "@server/policies/policy";
import { workingsCsv } from "@server/presenters/workings-csv";
import { loadEnergyPoint, type EnergyPoint } from "@server/queries/energy/energy-point";
import { readRange } from "@server/queries/energy/energy-range";
import { workingsOf } from "@server/queries/workings/workings-of";

const policy = may("seeEnergy");

/** How a figure came about: for a screen, for a spreadsheet and for paper. */
export const workingsRoutes: readonly Endpoint[] = [
  defineEndpoint(getWorkings, {
    policy,
    handle: async (context, input) => (await load(context, input)).model,
  }),
  defineEndpoint(downloadWorkingsCsv, {
    policy,
    handle: async (context, input) => workingsCsv((await load(context, input)).model),
  }),
  defineEndpoint(downloadWorkingsPdf, {
    policy,
    async handle(context, input) {
      const { model, energyPoint } = await load(context, input);
      const { language } = input.query;
      const { unitSystem } = energyPoint.site;
      const nowMs = context.clock.now();
      const body = await context.services.printer.workings(model, { language, unitSystem, nowMs });
      const { loopTag, zone } = model.subject;
      const day = localDateOf(Date.parse(model.from), zone);
      const name = `${loopTag}_${model.figure}_${day}.pdf`;
      const byteLength = body.length;
      return new FileAnswer({ name, contentType: "application/pdf", body, byteLength });
    },
  }),
];

async function load(
  context: Context,
  { params, query }: Pick<Input<typeof getWorkings>, "params" | "query">,
): Promise<{ model: Workings; energyPoint: EnergyPoint }> {
  const energyPoint = await loadEnergyPoint(context, params.pointId);
  const range = readRange(query, energyPoint.site.zone);
  const { figure, register } = query;
  const asked = { figure, register, range };
  const model = await workingsOf(context, energyPoint, asked, context.clock.now());
  return { model, energyPoint };
}
