import { useQuery } from "@tanstack/react-query";
import { useState } from "react";
import type { Place } from "../../../../shared/contracts/places.ts";
import { hasDuty } from "../../../../shared/roles.ts";
import { paths } from "../../../app/paths.ts";
import type { DataColumn } from "../../../components/data-table/data-column.ts";
import { DataTable } from "../../../components/data-table/data-table.tsx";
import { pagedTable, usePages } from "../../../components/data-table/use-paged-table.ts";
import { RoomPage } from "../../../components/layouts/room-page.tsx";
import { Section } from "../../../components/layouts/section.tsx";
import { Answer } from "../../../components/ui/answer.tsx";
import { Button } from "../../../components/ui/button.tsx";
import { EmptyState } from "../../../components/ui/empty-state.tsx";
import { LinkButton } from "../../../components/ui/link-button.tsx";
import { formatInstant } from "../../../lib/formatters.ts";
import { useInvestigation } from "../../../lib/investigation-context.ts";
import { useSession } from "../../../lib/session-context.ts";
import { settingWords, wordFor } from "../../../lib/words.ts";
import { placesQuery } from "../api/list-places.ts";
import { PlaceForm } from "../components/place-form.tsx";

function placeColumns(timeZone: string): DataColumn<Place>[] {
  return [
    {
      id: "name",
      header: "Place",
      rowHeader: true,
      cell: (place) =>
        place.name ?? `${place.setting === "household" ? "household" : "place"} ${place.number}`,
    },
    { id: "number", header: "Number", numeric: true, cell: (place) => place.number },
    {
      id: "setting",
      header: "Setting",
      cell: ({ setting }) => (
        <Answer value={setting} format={(code) => wordFor(settingWords, String(code))} />
      ),
    },
    { id: "area", header: "Area", cell: ({ area }) => <Answer value={area} /> },
    {
      id: "recordedAt",
      header: "Recorded",
      cell: (place) => formatInstant(place.recordedAt, timeZone),
    },
  ];
}

/** Places of exposure and households. */
export function Component() {
  const { id, timeZone } = useInvestigation();
  const { actingRole } = useSession();
  const pages = usePages();
  const [adding, setAdding] = useState(false);
  const [columns] = useState(() => placeColumns(timeZone));
  const places = useQuery(placesQuery(id, pages.page, pages.pageSize));
  const mayRecord = hasDuty(actingRole, "recordPlace");
  return (
    <RoomPage
      title="Places"
      subLine="Where exposures happened, and households."
      actions={
        <>
          <LinkButton to={paths.trace(id)}>Trace</LinkButton>
          {mayRecord && !adding ? (
            <Button variant="primary" onClick={() => setAdding(true)}>
              Record a place
            </Button>
          ) : null}
        </>
      }
    >
      {adding ? (
        <Section title="New place">
          <PlaceForm investigationId={id} onDone={() => setAdding(false)} />
        </Section>
      ) : null}
      <DataTable<Place>
        {...pagedTable(places, pages)}
        caption="Places on record"
        noun="places"
        columns={columns}
        rowId={(place) => place.id}
        empty={
          <EmptyState title="No place is on record yet">
            Places are recorded here, or while listing contacts in an interview.
          </EmptyState>
        }
      />
    </RoomPage>
  );
}
