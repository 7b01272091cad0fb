import { formatNumber } from "../../lib/formatters.ts";

export type UpdatingLineProps = {
  graphVersion: number | undefined;
  /** A newer answer is on its way. */
  updating: boolean;
};

/** Says, while a newer answer is fetched, which version the shown figures are of. */
export function UpdatingLine({ graphVersion, updating }: UpdatingLineProps) {
  return (
    <p role="status" className="min-h-[1.5em] text-sm text-ink-2">
      {updating && graphVersion !== undefined
        ? `as of version ${formatNumber(graphVersion)}, updating`
        : null}
    </p>
  );
}
