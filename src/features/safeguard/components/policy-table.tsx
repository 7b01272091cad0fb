import { Fragment } from "react";
import { ROLE_NAMES, ROLES } from "../../../../shared/roles.ts";
import { ScrollRegion } from "../../../components/ui/scroll-region.tsx";
import { Cell, HeadCell, Table } from "../../../components/ui/table.tsx";
import type { PolicyItem } from "../policy-disagreements.ts";
import { AccessWord } from "./access-word.tsx";

export type PolicyTableProps = { caption: string; items: readonly PolicyItem[] };

/** A long name that may break after a dot or an underline, nowhere else. */
function breakable(name: string) {
  const parts = name.split(/(?<=[._])/);
  return parts.map((part, index) => (
    // biome-ignore lint/suspicious/noArrayIndexKey: parts of one fixed name
    <Fragment key={index}>
      {part}
      <wbr />
    </Fragment>
  ));
}

/** Columns of one class: for each role what the registry says, and beside it what the database does. */
export function PolicyTable({ caption, items }: PolicyTableProps) {
  return (
    <ScrollRegion label={`Table: ${caption}`} className="-mx-1 px-1">
      <Table caption={caption} hideCaption className="min-w-[53rem] table-fixed sm:min-w-[60rem]">
        <colgroup>
          <col className="w-[9rem] sm:w-[15rem] xl:w-[20rem]" />
          {ROLES.map((role) => (
            <Fragment key={role}>
              <col />
              <col />
            </Fragment>
          ))}
        </colgroup>
        <thead>
          <tr>
            <HeadCell rowSpan={2}>Field, and the column that keeps it</HeadCell>
            {ROLES.map((role) => (
              <HeadCell key={role} colSpan={2} scope="colgroup" className="border-b-0 ps-3">
                {ROLE_NAMES[role]}
              </HeadCell>
            ))}
          </tr>
          <tr>
            {ROLES.map((role) => (
              <Fragment key={role}>
                <HeadCell className="ps-3 first:ps-3">registry</HeadCell>
                <HeadCell>database</HeadCell>
              </Fragment>
            ))}
          </tr>
        </thead>
        <tbody>
          {items.map((item) => (
            <tr key={`${item.table}.${item.column}`}>
              <HeadCell scope="row">
                {item.key ? <span className="me-1">{item.key}</span> : null}{" "}
                <span className={item.key ? "text-sm text-ink-2" : ""}>
                  {breakable(`${item.table}.${item.column}`)}
                </span>
              </HeadCell>
              {ROLES.map((role) => {
                const registry = item.registry[role] ?? "none";
                const database = item.catalogue[role] ?? "none";
                const differs = registry !== database;
                return (
                  <Fragment key={role}>
                    <Cell className="ps-3">
                      <AccessWord access={registry} />
                    </Cell>
                    <Cell>
                      <AccessWord access={database} differs={differs} />
                      {differs ? <span className="sr-only"> differs from the registry</span> : null}
                    </Cell>
                  </Fragment>
                );
              })}
            </tr>
          ))}
        </tbody>
      </Table>
    </ScrollRegion>
  );
}
