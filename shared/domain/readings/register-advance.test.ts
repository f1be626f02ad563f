import { registerAdvance } from "./register-advance";

const reads = { opening: 99_640, closing: 318, multiplier: 1, digits: 5, rolledOver: true };

test("what passed is the difference times the plate's multiplier", () => {
  const plain = { opening: 184_632, closing: 187_059, digits: null, rolledOver: false };
  expect(registerAdvance({ ...plain, multiplier: 1 })).toEqual({ ok: true, advance: 2427 });
  expect(registerAdvance({ ...plain, multiplier: 10 })).toEqual({ ok: true, advance: 24_270 });
});

test("a fall is refused, never taken by its size", () => {
  expect(registerAdvance({ ...reads, rolledOver: false })).toEqual({
    ok: false,
    problem: "closingBelowOpening",
  });
});

test("a rollover needs the word of somebody and the digits of the register", () => {
  expect(registerAdvance(reads)).toEqual({ ok: true, advance: 678 });
  expect(registerAdvance({ ...reads, multiplier: 10 })).toEqual({ ok: true, advance: 6780 });
  expect(registerAdvance({ ...reads, digits: null })).toEqual({
    ok: false,
    problem: "digitsNeeded",
  });
});

test("reads that fit neither the digits nor a rollover are refused", () => {
  expect(registerAdvance({ ...reads, digits: 4 })).toEqual({
    ok: false,
    problem: "moreThanDigits",
  });
  expect(registerAdvance({ ...reads, opening: 318, closing: 99_640 })).toEqual({
    ok: false,
    problem: "didNotRollOver",
  });
});

test("a register that did not move has passed nothing", () => {
  expect(registerAdvance({ ...reads, closing: 99_640, rolledOver: false })).toEqual({
    ok: true,
    advance: 0,
  });
});
