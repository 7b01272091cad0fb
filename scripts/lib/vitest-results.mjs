// Vitest reporter: the counts and the reasons of skips that scripts/test.mjs adds up.
import { mkdirSync, writeFileSync } from "node:fs";
import { dirname } from "node:path";

/** Writes {passed, failed, skipped: [{name, reason}], faults: [name]} to VITEST_RESULTS. */
export class VitestResults {
  onTestRunEnd(modules, unhandled) {
    const results = { passed: 0, failed: 0, skipped: [], faults: [] };
    for (const module of modules) {
      const suites = [module, ...module.children.allSuites()];
      // Errors outside a test (imports, hooks of a whole file) have no test to count against.
      for (const suite of suites) {
        if (suite.errors().length > 0)
          results.faults.push(suite.fullName ?? module.relativeModuleId);
      }
      for (const test of module.children.allTests()) {
        const { state, note } = test.result();
        const name = `${module.relativeModuleId} > ${test.fullName}`;
        if (state === "passed") results.passed += 1;
        else if (state === "skipped") results.skipped.push({ name, reason: note });
        else results.failed += 1;
      }
    }
    for (const error of unhandled) results.faults.push(`unhandled: ${error.message}`);
    const file = process.env.VITEST_RESULTS;
    if (!file) return;
    mkdirSync(dirname(file), { recursive: true });
    writeFileSync(file, JSON.stringify(results));
  }
}

// biome-ignore lint/style/noDefaultExport: Vitest loads a reporter by its default export.
export default VitestResults;
