import { useQuery } from "@tanstack/react-query";
import { type FormEvent, useId, useState } from "react";
import type { SavedFilter, SavedQuestion } from "../../../../shared/contracts/people-filters.ts";
import { FIELD_ERRORS } from "../../../../shared/errors.ts";
import { Button } from "../../../components/ui/button.tsx";
import { DropPanel } from "../../../components/ui/drop-panel.tsx";
import { ApiError, errorWords } from "../../../lib/api-error.ts";
import { withoutBlanks } from "../api/list-people.ts";
import { savedFiltersQuery, useSavedFilterChanges } from "../api/saved-filters.ts";
import type { ListState } from "../use-list-state.ts";

export type SavedFiltersProps = { investigationId: string; state: ListState };

/** What stands beside a name that the server would not take. */
function nameError(error: Error | null): string | null {
  if (!error) return null;
  const field = error instanceof ApiError ? error.errors[0] : undefined;
  if (field?.path === "filter.area") return "This area is not on record, so it cannot be kept.";
  if (field?.code === "repeated") return "Another saved filter has this name.";
  return `${field ? FIELD_ERRORS[field.code] : errorWords(error)}.`;
}

/** Filters under names of one's own: ask one again, keep the present one, rename, delete. */
export function SavedFilters({ investigationId, state }: SavedFiltersProps) {
  const saved = useQuery(savedFiltersQuery(investigationId));
  const { save, change, drop } = useSavedFilterChanges(investigationId);
  const items = saved.data?.items ?? [];
  const { q: typedWords, ...kept } = state.question;

  return (
    <DropPanel
      label="Saved filters"
      panelLabel="Saved filters"
      size="normal"
      className="w-80 max-sm:fixed max-sm:inset-x-3 max-sm:top-14 max-sm:w-auto"
    >
      {(close) => (
        <div className="grid gap-3 py-1">
          {items.length === 0 ? (
            <p className="text-sm text-ink-2">
              None yet. Set filters, then keep them here by name.
            </p>
          ) : (
            <ul className="border-t border-rule">
              {items.map((item) => (
                <SavedItem
                  key={item.id}
                  item={item}
                  onApply={() => {
                    state.apply(item.filter);
                    close();
                  }}
                  onRename={(name) =>
                    change.mutateAsync({ id: item.id, version: item.version, name })
                  }
                  onDrop={() => drop.mutate(item.id)}
                />
              ))}
            </ul>
          )}
          <SaveForm
            error={nameError(save.error)}
            pending={save.isPending}
            onSave={(name) =>
              save.mutateAsync({ name, filter: withoutBlanks(kept) as SavedQuestion })
            }
          />
          {typedWords ? (
            <p className="text-sm text-ink-2">What is typed into Find is not kept with it.</p>
          ) : null}
        </div>
      )}
    </DropPanel>
  );
}

type SaveFormProps = {
  error: string | null;
  pending: boolean;
  onSave: (name: string) => Promise<unknown>;
};

function SaveForm({ error, pending, onSave }: SaveFormProps) {
  const id = useId();
  const [name, setName] = useState("");
  function submit(event: FormEvent) {
    event.preventDefault();
    if (name.trim() === "") return;
    onSave(name.trim()).then(
      () => setName(""),
      () => {},
    );
  }
  return (
    <form onSubmit={submit} noValidate>
      <label htmlFor={id} className="block text-sm text-ink-2">
        Keep the present filter and order as
      </label>
      <div className="mt-1 flex gap-2">
        <input
          id={id}
          className="field-box min-w-0 flex-1"
          maxLength={60}
          autoComplete="off"
          value={name}
          aria-invalid={error !== null || undefined}
          aria-describedby={error ? `${id}-error` : undefined}
          onChange={(event) => setName(event.target.value)}
        />
        <Button type="submit" pending={pending}>
          Keep
        </Button>
      </div>
      {error ? (
        <p id={`${id}-error`} role="alert" className="mt-1 text-sm text-coral">
          {error}
        </p>
      ) : null}
    </form>
  );
}

type SavedItemProps = {
  item: SavedFilter;
  onApply: () => void;
  onRename: (name: string) => Promise<unknown>;
  onDrop: () => void;
};

function SavedItem({ item, onApply, onRename, onDrop }: SavedItemProps) {
  const [name, setName] = useState<string | null>(null);
  const [error, setError] = useState<string | null>(null);
  if (name !== null) {
    return (
      <li className="border-b border-rule py-1">
        <form
          noValidate
          className="flex gap-2"
          onSubmit={(event) => {
            event.preventDefault();
            onRename(name.trim()).then(
              () => setName(null),
              (failed) => setError(nameError(failed)),
            );
          }}
        >
          <input
            // biome-ignore lint/a11y/noAutofocus: the press on Rename asked for this box
            autoFocus
            aria-label={`New name of ${item.name}`}
            className="field-box min-w-0 flex-1"
            maxLength={60}
            value={name}
            onChange={(event) => setName(event.target.value)}
          />
          <Button type="submit" size="small">
            Rename
          </Button>
        </form>
        {error ? (
          <p role="alert" className="text-sm text-coral">
            {error}
          </p>
        ) : null}
      </li>
    );
  }
  return (
    <li className="flex items-center gap-1 border-b border-rule">
      <button
        type="button"
        className="min-h-9 min-w-0 flex-1 truncate text-start underline decoration-rule underline-offset-4 hover:decoration-kelp"
        onClick={onApply}
      >
        {item.name}
      </button>
      <Button
        size="small"
        variant="plain"
        aria-label={`Rename ${item.name}`}
        onClick={() => setName(item.name)}
      >
        Rename
      </Button>
      <Button size="small" variant="plain" aria-label={`Delete ${item.name}`} onClick={onDrop}>
        Delete
      </Button>
    </li>
  );
}
