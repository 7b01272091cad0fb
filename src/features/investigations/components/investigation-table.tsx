import type { ReactNode } from "react";
import type { Investigation } from "../../../../shared/contracts/investigations.ts";
import { ROLE_NAMES } from "../../../../shared/roles.ts";
import { Answer } from "../../../components/ui/answer.tsx";
import { ScrollRegion } from "../../../components/ui/scroll-region.tsx";
import { Cell, HeadCell, Table } from "../../../components/ui/table.tsx";
import { Tag } from "../../../components/ui/tag.tsx";
import { formatNumber } from "../../../lib/formatters.ts";

export type InvestigationTableProps = {
  investigations: readonly Investigation[];
  /** What can be done with a row: act in it, or words that one does. */
  action: (investigation: Investigation) => ReactNode;
};

/** The investigations one works in, with the settings their reports stand on. */
export function InvestigationTable({ investigations, action }: InvestigationTableProps) {
  return (
    <ScrollRegion label="Your investigations">
      <Table caption="Investigations you hold a role in" hideCaption>
        <thead>
          <tr>
            <HeadCell>name</HeadCell>
            <HeadCell>your roles</HeadCell>
            <HeadCell numeric>population at risk</HeadCell>
            <HeadCell numeric>infectious window</HeadCell>
            <HeadCell numeric>monitoring</HeadCell>
            <HeadCell>zone</HeadCell>
            <HeadCell>
              <span className="sr-only">act in it</span>
            </HeadCell>
          </tr>
        </thead>
        <tbody>
          {investigations.map((one) => (
            <tr key={one.id}>
              <HeadCell scope="row" className="whitespace-nowrap">
                {one.name}{" "}
                {one.practice ? (
                  <Tag tone="ochre">practice</Tag>
                ) : one.invented ? (
                  <Tag tone="ochre">invented</Tag>
                ) : null}
              </HeadCell>
              <Cell>{one.roles.map((role) => ROLE_NAMES[role]).join(", ")}</Cell>
              <Cell numeric>
                <Answer
                  kind="figure"
                  reason="not declared"
                  value={one.populationAtRisk}
                  format={(value) => formatNumber(Number(value))}
                />
              </Cell>
              <Cell numeric>
                −{one.infectiousBefore} … +{one.infectiousAfter} days
              </Cell>
              <Cell numeric>{one.monitoringDays} days</Cell>
              <Cell>{one.timeZone}</Cell>
              <Cell className="text-end">{action(one)}</Cell>
            </tr>
          ))}
        </tbody>
      </Table>
    </ScrollRegion>
  );
}
