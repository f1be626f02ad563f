import { z } from "zod";
import { contract } from "@shared/contracts/contract";
import { defineEndpoint } from "./define-endpoint";

const hello = contract({
  operationId: "hello",
  summary: "Greets",
  tag: "Test",
  method: "get",
  path: "/hello",
  answer: z.object({ text: z.string() }),
});

it("does not compile without a policy", () => {
  const handle = async () => ({ text: "hello" });
  // @ts-expect-error the type check fails here the day a policy may be left out
  expect(() => defineEndpoint(hello, { handle })).toThrow();
});
