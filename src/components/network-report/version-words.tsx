import { formatNumber } from "../../lib/formatters.ts";

export type VersionWordsProps = {
  graphVersion: number;
  /** A newer answer is on its way. */
  updating: boolean;
};

/** Which version the figures are of; while a newer answer is fetched, that it is. */
export function VersionWords({ graphVersion, updating }: VersionWordsProps) {
  const version = `version ${formatNumber(graphVersion)}`;
  return <span role="status">{updating ? `as of ${version}, updating` : version}</span>;
}
