import { AccessToken } from "@server/models/access-token";
import { Building } from "@server/models/building";
import { secretHash } from "@server/security/secrets";
import { savedComparison } from "./comparison-factories";
import { evidenceOfPoint } from "./evidence-factories";
import { correctedPoint } from "./correction-factories";
import { person, type Person } from "./factories";
import { batchOfSite, recognisedImport, savedRecipe } from "./import-factories";
import { pointToMeter } from "./place-factories";
import type { TestApp } from "./test-app";

type MakeIds = (app: TestApp, owner: Person) => Promise<Record<string, string>>;

let count = 0;

const people: MakeIds = async (app, owner) => {
  count += 1;
  const member = await person(app, { organisationId: owner.organisationId });
  const token = await AccessToken.create({
    organisationId: owner.organisationId,
    membershipId: owner.membership.id,
    name: "a token",
    secretHash: secretHash(`token ${count}`),
    createdAt: app.clock.date(),
  });
  return { memberId: member.membership.id, tokenId: token.id };
};

const places: MakeIds = async (app, owner) => {
  const { organisationId } = owner;
  const { site, loop, point } = await pointToMeter(app, organisationId);
  const building = await Building.create({
    organisationId,
    siteId: site.id,
    name: "Engine house",
    createdAt: app.clock.date(),
  });
  const recipe = await savedRecipe(app, owner);
  return {
    siteId: site.id,
    loopId: loop.id,
    pointId: point.id,
    // No id, but a part of the path all the same.
    channel: "outdoor",
    buildingId: building.id,
    recipeId: recipe.id,
    ...(await batchOfSite(app, recipe, site.id)),
  };
};

const logs: MakeIds = async (app, { organisationId }) => {
  const { point } = await pointToMeter(app, organisationId);
  const { row, file } = await recognisedImport(app, { organisationId, pointId: point.id });
  return { importId: row.id, fileId: file.id };
};

const evidence: MakeIds = async (app, { organisationId }) => {
  const { point } = await pointToMeter(app, organisationId);
  const made = await evidenceOfPoint(app, organisationId, point.id);
  return {
    instrumentId: made.meter.id,
    certificateId: made.certificate.id,
    bathCheckId: made.check.id,
    installationId: made.installation.id,
  };
};

const corrections: MakeIds = async (app, { organisationId }) => {
  const { point } = await pointToMeter(app, organisationId);
  return correctedPoint(app, { organisationId, pointId: point.id });
};

const comparisons: MakeIds = async (app, owner) => {
  const { site } = await pointToMeter(app, owner.organisationId);
  return { meterComparisonId: (await savedComparison(app, owner, site.id)).id };
};

/**
 * Makes one row of everything whose id stands in a path of the API, and answers the ids by the
 * path's parameter name. A new `:xId` needs a line here: the tenancy test asks for it.
 */
export async function ownedIds(app: TestApp, owner: Person): Promise<Record<string, string>> {
  const families = [people, places, logs, evidence, corrections, comparisons];
  const ids = [];
  for (const make of families) ids.push(await make(app, owner));
  return Object.assign({}, ...ids) as Record<string, string>;
}
