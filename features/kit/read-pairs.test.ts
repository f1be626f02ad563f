import { readPairs, writePairs } from "./read-pairs";

const pair = { firstC: 4.11, secondC: 4 };

it.each(["4.11\t4.00", "4,11;4,00", "4.11, 4.00", "4.11,4.00", "4,11 4,00", "  4.11   4 "])(
  "reads %j as one pair",
  (line) => {
    expect(readPairs(line)).toEqual({ pairs: [pair], unreadable: [] });
  },
);

it("names the lines that are not two numbers and passes empty ones", () => {
  const text = "4.11\t4.00\n\nfirst second\n4.11\n4.11\t4.00\t4.01\n-0.1\t0.02";
  expect(readPairs(text)).toEqual({
    pairs: [pair, { firstC: -0.1, secondC: 0.02 }],
    unreadable: [3, 4, 5],
  });
});

it("reads back what it writes", () => {
  const pairs = [pair, { firstC: -0.05, secondC: 0.01 }];
  expect(readPairs(writePairs(pairs)).pairs).toEqual(pairs);
});
