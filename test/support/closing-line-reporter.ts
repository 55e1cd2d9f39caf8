import type { Reporter, TestModule } from 'vitest/node';

/** Prints the plain closing line `N passed, N failed, N skipped` after every run. */
export default class ClosingLineReporter implements Reporter {
  onTestRunEnd(modules: readonly TestModule[]): void {
    const counts = { passed: 0, failed: 0, skipped: 0, pending: 0 };
    let brokenFiles = 0;
    for (const module of modules) {
      for (const test of module.children.allTests()) counts[test.result().state] += 1;
      if (module.state() === 'failed' && module.errors().length > 0) brokenFiles += 1;
    }
    const failed = counts.failed + brokenFiles;
    const skipped = counts.skipped + counts.pending;
    process.stdout.write(
      `\n${String(counts.passed)} passed, ${String(failed)} failed, ${String(skipped)} skipped\n`,
    );
  }
}
