// Prints `N passed, N failed` from vitest's JSON report; exits 1 unless all that ran passed.
import { readFileSync } from 'node:fs';

const { numPassedTests, numFailedTests, numTotalTests, success } = JSON.parse(
  readFileSync(process.argv[2], 'utf8'),
);
console.log(`${numPassedTests} passed, ${numFailedTests} failed`);
const allPassed = success && numFailedTests === 0 && numPassedTests === numTotalTests;
process.exitCode = allPassed && numPassedTests > 0 ? 0 : 1;
