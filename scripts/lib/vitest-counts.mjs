// @ts-check
import { writeFileSync } from 'node:fs';
import { relative } from 'node:path';
import { root } from './root.mjs';

/**
 * A vitest reporter: a line a file as it finishes, and the counts and skips as JSON in the file named by TEST_COUNTS.
 *
 * @typedef {{ passed: number, failed: number, skipped: { title: string, reason: string }[] }} Counts
 */
export default class CountingReporter {
  /** @param {import('vitest/node').TestModule} module */
  onTestModuleEnd(module) {
    const counts = countModule(module);
    const sign = counts.failed > 0 ? '✗' : '✓';
    const name = relative(root, module.moduleId);
    const seconds = (module.diagnostic().duration / 1000).toFixed(1);
    process.stdout.write(
      `${sign} ${name}: ${counts.passed} passed, ${counts.failed} failed (${seconds} s)\n`,
    );
  }

  /** @param {readonly import('vitest/node').TestModule[]} modules @param {readonly unknown[]} errors */
  onTestRunEnd(modules, errors) {
    /** @type {Counts} */
    const total = { passed: 0, failed: errors.length, skipped: [] };
    for (const module of modules) {
      const counts = countModule(module);
      total.passed += counts.passed;
      total.failed += counts.failed;
      total.skipped.push(...counts.skipped);
    }
    const file = process.env.TEST_COUNTS;
    if (file) writeFileSync(file, JSON.stringify(total));
  }
}

/**
 * A file or a group that fails outside its tests (it does not load, its preparation breaks) is one failure as well.
 * @param {import('vitest/node').TestModule} module
 * @returns {Counts}
 */
function countModule(module) {
  /** @type {Counts} */
  const counts = { passed: 0, failed: module.errors().length, skipped: [] };
  for (const suite of module.children.allSuites()) counts.failed += suite.errors().length;
  for (const test of module.children.allTests()) {
    const result = test.result();
    if (result.state === 'passed') counts.passed += 1;
    else if (result.state === 'skipped')
      counts.skipped.push({ title: test.fullName, reason: result.note ?? '' });
    else counts.failed += 1;
  }
  return counts;
}
