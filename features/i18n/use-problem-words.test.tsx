import { renderHook } from "@testing-library/react";

import type { Problem } from "@shared/contracts/contract";

import { i18nInstance } from "./i18n";
import { useFieldWords } from "./use-problem-words";

type FieldError = NonNullable<Problem["errors"]>[number];

const most = (change: Partial<FieldError> = {}): FieldError => ({
  pointer: "/body/flowDriftPercent",
  code: "too-big",
  message: "Too big: expected number to be <=10",
  bound: { of: "number", limit: 10, included: true },
  ...change,
});

async function said(language: "en" | "de", error: FieldError): Promise<string> {
  await i18nInstance.changeLanguage(language);
  const { result } = renderHook(() => useFieldWords());
  return result.current(error).replace(/\u00a0/g, " ");
}

afterAll(() => i18nInstance.changeLanguage("en"));

it("says a bound with its limit and unit in the language on screen", async () => {
  expect(await said("en", most())).toBe("At most 10 %.");
  expect(await said("de", most())).toBe("Höchstens 10 %.");
  const small = most({
    pointer: "/body/meterPlate/permanentFlowM3PerHour",
    code: "too-small",
    bound: { of: "number", limit: 0, included: false },
  });
  expect(await said("de", small)).toBe("Mehr als 0 m³/h.");
});

it("writes limits with the decimals and marks of the language", async () => {
  const least = (limit: number) =>
    most({ code: "too-small", pointer: "/body/x", bound: { of: "number", limit, included: true } });
  expect(await said("de", least(0.001))).toBe("Mindestens 0,001.");
  expect(
    await said(
      "en",
      most({
        pointer: "/body/designFlowM3PerHour",
        bound: { of: "number", limit: 10_000, included: true },
      }),
    ),
  ).toBe("At most 10,000 m³/h.");
});

it("counts characters and entries", async () => {
  const text = (limit: number, code: string) =>
    most({ code, pointer: "/body/name", bound: { of: "text", limit, included: true } });
  expect(await said("en", text(120, "too-big"))).toBe("120 characters at most.");
  expect(await said("en", text(1, "too-small"))).toBe("This must not be empty.");
  const list = most({ code: "too-small", bound: { of: "list", limit: 1, included: true } });
  expect(await said("de", list)).toBe("Mindestens 1 Eintrag.");
});

it("keeps the server's word where there is no bound", async () => {
  const own: FieldError = { pointer: "/body/x", code: "made-up", message: "In English." };
  expect(await said("de", own)).toBe("In English.");
});
