const { default: Sequencer } = require("@jest/test-sequencer");

const killTest = /[\\/]test[\\/]kill[\\/]/;

/**
 * Jest's own order, but for the kill test: it takes as long as a third of all others together, so it
 * starts first. Left to the end it would run alone, with all other workers idle.
 */
module.exports = class extends Sequencer {
  async sort(tests) {
    const sorted = await super.sort(tests);
    const isKill = ({ path }) => killTest.test(path);
    return [...sorted.filter(isKill), ...sorted.filter((test) => !isKill(test))];
  }
};
