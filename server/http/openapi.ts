import { z } from "zod";
import { problem, type Contract } from "@shared/contracts/contract";
import type { Endpoint } from "./define-endpoint";

type Schema = Record<string, unknown>;

/** `:name` of the router as `{name}` of the document. */
export function documentPath(path: string): string {
  return path.replace(/:(\w+)/g, "{$1}");
}

/** `io` says which side of coercions and defaults is meant: what callers send, or what they get. */
function schemaOf(type: z.ZodType, io: "input" | "output"): Schema {
  const schema: Schema = z.toJSONSchema(type, { io, unrepresentable: "any" });
  delete schema.$schema;
  return schema;
}

function parametersOf(type: z.ZodType, where: "path" | "query"): Schema[] {
  if (!(type instanceof z.ZodObject)) return [];
  return Object.entries(type.shape).map(([name, field]) => {
    const { description, ...schema } = schemaOf(field as z.ZodType, "input");
    return {
      name,
      in: where,
      required: where === "path" || !(field as z.ZodType).safeParse(undefined).success,
      ...(description === undefined ? {} : { description }),
      schema,
    };
  });
}

function bodyOf(contract: Contract): Schema {
  const schema = schemaOf(contract.body, "input");
  const isEmpty = Object.keys((schema.properties as object | undefined) ?? {}).length === 0;
  if (contract.bodyKind === "json" && isEmpty && !("anyOf" in schema) && !("oneOf" in schema))
    return {};
  const content =
    contract.bodyKind === "multipart"
      ? { "multipart/form-data": { schema: uploadSchema(schema) } }
      : { "application/json": { schema } };
  return { requestBody: { required: true, content } };
}

/** Uploads carry one file in the field `file`, beside the text fields of the contract. */
function uploadSchema(fields: Schema): Schema {
  const file = { type: "string", contentMediaType: "application/octet-stream" };
  return { ...fields, properties: { ...(fields.properties as object), file }, required: ["file"] };
}

function answerContent(contract: Contract): Schema {
  if (contract.answerKind === "csv") return { "text/csv": { schema: { type: "string" } } };
  if (contract.answerKind === "file") return { "application/octet-stream": {} };
  return { "application/json": { schema: schemaOf(contract.answer, "output") } };
}

function problemAnswer(description: string): Schema {
  return {
    description,
    content: { "application/problem+json": { schema: { $ref: "#/components/schemas/Problem" } } },
  };
}

function operationOf({ contract, policy, status }: Endpoint): Schema {
  const parameters = [
    ...parametersOf(contract.params, "path"),
    ...parametersOf(contract.query, "query"),
  ];
  return {
    operationId: contract.operationId,
    summary: contract.summary,
    tags: [contract.tag],
    ...(parameters.length > 0 ? { parameters } : {}),
    ...bodyOf(contract),
    security: policy.needsActor ? [{ bearer: [] }, { session: [] }] : [],
    responses: {
      [status]: { description: "Done", content: answerContent(contract) },
      default: problemAnswer("A problem; `code` is stable, `remedy` says what to do"),
    },
  };
}

/** The whole API as an OpenAPI 3.1 document, made from the contracts the router runs on. */
export function openApiDocument(endpoints: readonly Endpoint[]): Schema {
  const paths: Record<string, Schema> = {};
  for (const endpoint of endpoints) {
    const path = documentPath(endpoint.contract.path);
    paths[path] = { ...paths[path], [endpoint.contract.method]: operationOf(endpoint) };
  }
  return {
    openapi: "3.1.0",
    info: {
      title: "Loopwright",
      version: "1",
      description:
        "Heat and cooling energy from flow and temperature logs. Scripts either send a bearer " +
        "token (`Authorization: Bearer lw_…`, made under Members by an administrator) or sign in " +
        "with POST /session and send the cookie back; requests that change something then also " +
        "need the header `X-Loopwright-Request: 1`. Ids are text. Instants are ISO 8601 in UTC.",
    },
    servers: [{ url: "/api/v1" }],
    paths,
    components: {
      schemas: { Problem: schemaOf(problem, "output") },
      securitySchemes: {
        bearer: { type: "http", scheme: "bearer" },
        session: { type: "apiKey", in: "cookie", name: "loopwright_session" },
      },
    },
  };
}
