import type { Group } from "../../../shared/contracts/network.ts";
import type { DataColumn } from "../../components/data-table/data-column.ts";
import { PersonMark } from "../../components/person-mark/person-mark.tsx";
import { formatNumber } from "../../lib/formatters.ts";
import { type GroupPlaces, groupCode, groupColor } from "../../lib/group-places.ts";

/** "+12", "0", "−3": a change is never shown without its sign. */
export function growthText(grown: number): string {
  if (grown === 0) return "0";
  return `${grown > 0 ? "+" : "−"}${formatNumber(Math.abs(grown))}`;
}

/** Columns of the groups in Review: what changed first, so that a phone shows it. */
export function groupColumns(places: GroupPlaces): DataColumn<Group>[] {
  return [
    {
      id: "group",
      header: "group",
      hideable: false,
      cell: ({ id }) => (
        <>
          <PersonMark
            classification="confirmed"
            group={groupColor(places, id)}
            decorative
            className="me-2"
          />
          {groupCode(id)}
        </>
      ),
    },
    {
      id: "grownSince",
      header: "grown",
      numeric: true,
      sortKey: "grownSince",
      cell: ({ grownSince }) =>
        grownSince === 0 ? (
          <span className="text-ink-2">0</span>
        ) : (
          <strong>{growthText(grownSince)}</strong>
        ),
    },
    {
      id: "size",
      header: "people",
      numeric: true,
      sortKey: "size",
      cell: ({ size }) => formatNumber(size),
    },
    {
      id: "cases",
      header: "cases",
      numeric: true,
      sortKey: "cases",
      cell: ({ cases }) => formatNumber(cases),
    },
    {
      id: "contacts",
      header: "contacts",
      numeric: true,
      sortKey: "contacts",
      cell: ({ contacts }) => formatNumber(contacts),
    },
    {
      id: "place",
      header: "place by size",
      numeric: true,
      cell: ({ id }) => {
        const place = places.get(id);
        return place === undefined ? `after ${formatNumber(places.size)}` : formatNumber(place + 1);
      },
    },
  ];
}
