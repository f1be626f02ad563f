import { z } from "zod";
import { contract, instant } from "./contract";

export const getHealth = contract({
  operationId: "getHealth",
  summary: "Whether the server and its database answer",
  tag: "System",
  method: "get",
  path: "/health",
  answer: z.object({ status: z.literal("ok"), version: z.string(), now: instant }),
});

export const getOpenApi = contract({
  operationId: "getOpenApi",
  summary: "This document",
  tag: "System",
  method: "get",
  path: "/openapi.json",
  answer: z.record(z.string(), z.unknown()),
});
