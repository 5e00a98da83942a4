import type { Reporter, TestModule } from 'vitest/node';

/** Ends the output with "N passed, N failed", the line that says at a glance whether everything ran. */
export default class ClosingLine implements Reporter {
  onTestRunEnd(modules: ReadonlyArray<TestModule>): void {
    let passed = 0;
    let failed = 0;
    for (const module of modules) {
      for (const test of module.children.allTests()) {
        if (test.result().state === 'passed') passed += 1;
        if (test.result().state === 'failed') failed += 1;
      }
      // A file that does not load has no tests to count, but it is a failure.
      if (module.state() === 'failed' && module.errors().length > 0) failed += 1;
    }
    console.log(`\n${passed} passed, ${failed} failed`);
  }
}
