import { formatDay, formatInterval, formatNumber, noValue } from "../../lib/formatters.ts";
import { Cell, HeadCell, Table } from "../ui/table.tsx";
import { connectivity, halfWidth, type ThresholdInput } from "./threshold-input.ts";

/** The figures of a threshold strip as a table. */
export function ThresholdTable({ label, input }: { label: string; input: ThresholdInput }) {
  const half = halfWidth(input);
  const lines: { id: string; what: string; value: string; interval: string }[] = [
    {
      id: "observed",
      what: "pairs per person, observed",
      value: formatNumber(input.value, { decimals: 2 }),
      interval: formatInterval(input.interval),
    },
    { id: "giant", what: "giant component, 1 pair a person", value: "1", interval: "" },
    {
      id: "window",
      what: "critical window",
      value: "",
      interval: half === null ? noValue : formatInterval([Math.max(0, 1 - half), 1 + half]),
    },
    {
      id: "connectivity",
      what: "all connected, ln n",
      value: formatNumber(connectivity(input), { decimals: 2 }),
      interval: "",
    },
    { id: "n", what: "people, n", value: formatNumber(input.n), interval: "" },
    ...(input.trail ?? []).map(({ day, value }) => ({
      id: day,
      what: `as of ${formatDay(day)}`,
      value: formatNumber(value, { decimals: 2 }),
      interval: "",
    })),
  ];
  return (
    <Table caption={label}>
      <thead>
        <tr>
          <HeadCell>figure</HeadCell>
          <HeadCell numeric>value</HeadCell>
          <HeadCell numeric>from–to</HeadCell>
        </tr>
      </thead>
      <tbody>
        {lines.map((line) => (
          <tr key={line.id}>
            <HeadCell scope="row">{line.what}</HeadCell>
            <Cell numeric>{line.value}</Cell>
            <Cell numeric>{line.interval}</Cell>
          </tr>
        ))}
      </tbody>
    </Table>
  );
}
