import type { Reporter, SerializedError, TestModule } from 'vitest/node';

/**
 * Ends every run with the line `N passed, N failed`. A file that could not be loaded, an error outside any test, and
 * each check that failed before the tests (lint, types, build) count as one failure.
 */
export default class ClosingLine implements Reporter {
  onTestRunEnd(modules: readonly TestModule[], errors: readonly SerializedError[]): void {
    const counts = { passed: 0, failed: errors.length, skipped: 0 };
    for (const module of modules) {
      const failedBefore = counts.failed;
      for (const test of module.children.allTests()) {
        const { state } = test.result();
        if (state === 'passed' || state === 'failed' || state === 'skipped') counts[state] += 1;
      }
      if (module.state() === 'failed' && counts.failed === failedBefore) counts.failed += 1;
    }
    const complaints = (process.env['STILLROOM_FAILED_CHECKS'] ?? '')
      .split(',')
      .filter((name) => name !== '');
    for (const name of complaints)
      process.stdout.write(`\nFailed before the tests: ${name} (its words are above).`);
    const { passed, failed, skipped } = counts;
    const tail = skipped > 0 ? `, ${skipped} skipped` : '';
    process.stdout.write(`\n${passed} passed, ${failed + complaints.length} failed${tail}\n`);
  }
}
