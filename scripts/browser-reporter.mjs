// The runner's progress block ends without a line that a script can read: this adds one, from the runner's own results.
const count = (suite) => {
  const own = { passed: 0, failed: 0, skipped: 0 };
  for (const test of suite?.tests ?? []) own[test.skipped ? 'skipped' : test.passed ? 'passed' : 'failed'] += 1;
  for (const inner of suite?.suites ?? []) {
    const below = count(inner);
    for (const key of Object.keys(own)) own[key] += below[key];
  }
  return own;
};

export const closingLine = () => ({
  stop({ sessions }) {
    const all = [...sessions];
    const sum = { passed: 0, failed: 0, skipped: 0 };
    for (const session of all) {
      const own = count(session.testResults);
      for (const key of Object.keys(sum)) sum[key] += own[key];
    }
    const broken = all.filter((session) => !session.passed).length;
    // the runner prints its last block after this call: close after it
    process.on('exit', () => {
      console.log(`web-test-runner: ${all.length - broken} of ${all.length} test files passed`);
      console.log(`${sum.passed} passed, ${sum.failed} failed${sum.skipped ? `, ${sum.skipped} skipped` : ''}`);
    });
  },
});
