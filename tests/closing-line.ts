import { writeFileSync } from 'node:fs';
import process from 'node:process';
import type { Reporter, TestModule } from 'vitest/node';

/**
 * Counts what vitest ran, so that the gate runner can add it to its closing line.
 * With FAINTWARD_COUNTS set, the counts are written to that file as JSON.
 */
export default class ClosingLine implements Reporter {
  onTestRunEnd(modules: readonly TestModule[], errors: readonly unknown[]): void {
    let passed = 0;
    let failed = errors.length;
    let skipped = 0;
    for (const module of modules) {
      if (module.state() === 'failed' && module.children.size === 0) failed += 1;
      for (const test of module.children.allTests()) {
        const { state } = test.result();
        if (state === 'passed') passed += 1;
        else if (state === 'failed') failed += 1;
        else skipped += 1;
      }
    }
    const countsFile = process.env['FAINTWARD_COUNTS'];
    if (countsFile) writeFileSync(countsFile, JSON.stringify({ passed, failed, skipped }));
  }
}
