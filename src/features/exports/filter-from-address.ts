import { type ExportFilter, exportFilter } from "../../../shared/contracts/exports.ts";

/** What can be typed (an area may be) never stands in an address. */
const coded = exportFilter.keyof().exclude(["area"]).options;

/** The line list's coded filters, as they stand in an address; whatever is no filter is left out. */
export function filterFromAddress(params: URLSearchParams): ExportFilter {
  const out: Record<string, string> = {};
  for (const name of coded) {
    const value = params.get(name);
    if (value && exportFilter.shape[name].safeParse(value).success) out[name] = value;
  }
  return out as ExportFilter;
}
