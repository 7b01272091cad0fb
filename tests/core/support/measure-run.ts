import { mkdtempSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import type { AddedFigures } from "../../../scripts/measure/added-figures.ts";
import { measure } from "../../../scripts/measure/measure.ts";
import type { NetworkReport } from "../../../shared/core/index.ts";

/** A folder of its own for one test file's input, and the command's function run in it. */
export function measureFolder() {
  const folder = mkdtempSync(join(tmpdir(), "measure-"));
  return {
    folder,
    remove: () => rmSync(folder, { recursive: true, force: true }),
    write: (name: string, content: string | Uint8Array) =>
      writeFileSync(join(folder, name), content),
    run: async (...args: string[]) => {
      const { output, complaints, code } = await measure(args, folder);
      const report = output === null ? null : (JSON.parse(output) as NetworkReport & AddedFigures);
      return { code, complaints, output, report };
    },
  };
}

/** Lines of a CSV file. */
export const rows = (header: string, lines: readonly string[]): string =>
  `${[header, ...lines].join("\n")}\n`;
