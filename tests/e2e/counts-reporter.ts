import { writeFileSync } from 'node:fs';
import process from 'node:process';
import type { FullResult, Reporter, Suite } from '@playwright/test/reporter';

/** Counts the journeys, so that the gate runner can add them to its closing line. */
export default class CountsReporter implements Reporter {
  private suite: Suite | undefined;

  onBegin(_config: unknown, suite: Suite): void {
    this.suite = suite;
  }

  onEnd(result: FullResult): void {
    const tests = this.suite?.allTests() ?? [];
    const passed = tests.filter((test) => test.ok() && test.outcome() !== 'skipped').length;
    const skipped = tests.filter((test) => test.outcome() === 'skipped').length;
    const failed = tests.filter((test) => !test.ok()).length;
    const countsFile = process.env['FAINTWARD_COUNTS'];
    // A run that ends without a test having failed (no server, no browser) is a failure all the same.
    const failedAsWhole = result.status !== 'passed' && failed === 0 ? 1 : 0;
    if (countsFile) writeFileSync(countsFile, JSON.stringify({ passed, failed: failed + failedAsWhole, skipped }));
  }
}
