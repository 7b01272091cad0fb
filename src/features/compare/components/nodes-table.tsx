import { useState } from "react";
import { Link } from "react-router-dom";
import { PersonMark } from "../../../components/person-mark/person-mark.tsx";
import { Pagination } from "../../../components/ui/pagination.tsx";
import { Cell, HeadCell, Table } from "../../../components/ui/table.tsx";
import { formatNumber } from "../../../lib/formatters.ts";
import type { PictureNode } from "../picture-nodes.ts";
import { plainLink } from "./plain-link.ts";

export type NodesTableProps = {
  nodes: readonly PictureNode[];
  /** Where a person's page is; undefined where the role has no such page. */
  personTo?: (id: string) => string;
  /** Draws one group alone. */
  onGroup: (group: string) => void;
};

/** What the picture shows as rows: people with their groups, or groups with their sizes. */
export function NodesTable({ nodes, personTo, onGroup }: NodesTableProps) {
  const [page, setPage] = useState(1);
  const [pageSize, setPageSize] = useState(50);
  const last = Math.max(1, Math.ceil(nodes.length / pageSize));
  const shown = nodes.slice((Math.min(page, last) - 1) * pageSize, Math.min(page, last) * pageSize);
  const areGroups = nodes[0]?.level === "groups";
  const noun = areGroups ? "groups" : "people";
  return (
    <>
      <Table caption={`The ${noun} of the picture, the largest group first`}>
        <thead>
          <tr>
            <HeadCell>{areGroups ? "group" : "study number"}</HeadCell>
            {areGroups ? null : <HeadCell>classification</HeadCell>}
            {areGroups ? null : <HeadCell>group</HeadCell>}
            <HeadCell numeric>{areGroups ? "people" : "contact pairs drawn"}</HeadCell>
          </tr>
        </thead>
        <tbody>
          {shown.map((node) => (
            <tr key={node.id}>
              <HeadCell scope="row" className="whitespace-nowrap">
                {areGroups ? (
                  <GroupButton node={node} onGroup={onGroup} />
                ) : personTo ? (
                  <Link to={personTo(node.id)} className={plainLink}>
                    {node.label}
                  </Link>
                ) : (
                  node.label
                )}
              </HeadCell>
              {areGroups ? null : (
                <Cell>
                  <PersonMark {...node.mark} decorative className="me-2" />
                  {node.words}
                </Cell>
              )}
              {areGroups ? null : (
                <Cell>
                  {node.pairs > 0 ? <GroupButton node={node} onGroup={onGroup} /> : "no pair drawn"}
                </Cell>
              )}
              <Cell numeric>{formatNumber(areGroups ? node.size : node.pairs)}</Cell>
            </tr>
          ))}
        </tbody>
      </Table>
      <Pagination
        page={Math.min(page, last)}
        pageSize={pageSize}
        total={nodes.length}
        onPageChange={setPage}
        onPageSizeChange={setPageSize}
        noun={noun}
      />
    </>
  );
}

function GroupButton({ node, onGroup }: { node: PictureNode; onGroup: (group: string) => void }) {
  return (
    <button type="button" className={plainLink} onClick={() => onGroup(node.group)}>
      {node.groupLabel}
      <span className="sr-only">, draw this group alone</span>
    </button>
  );
}
