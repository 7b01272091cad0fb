import { Tabs as Primitive } from "radix-ui";
import type { ReactNode } from "react";

export type TabItem = {
  id: string;
  label: string;
  /** A plain figure after the label, such as the number of rows. */
  count?: number;
  content: ReactNode;
};

export type TabsProps = {
  /** Names the group of tabs for readers. */
  label: string;
  items: readonly TabItem[];
  value?: string;
  defaultValue?: string;
  onValueChange?: (id: string) => void;
};

/** Tabs with arrow keys; the chosen one is underlined, as in the room navigation. */
export function Tabs({ label, items, value, defaultValue, onValueChange }: TabsProps) {
  return (
    <Primitive.Root
      value={value}
      defaultValue={value === undefined ? (defaultValue ?? items[0]?.id) : undefined}
      onValueChange={onValueChange}
    >
      <Primitive.List
        aria-label={label}
        className="flex gap-5 overflow-x-auto border-b border-rule pt-0.5"
      >
        {items.map((item) => (
          <Primitive.Trigger
            key={item.id}
            value={item.id}
            className="-mb-px min-h-9 shrink-0 border-b-[3px] border-transparent px-0.5 pb-1
              text-ink-2 hover:text-ink focus-visible:-outline-offset-2
              data-[state=active]:border-kelp data-[state=active]:text-ink"
          >
            {item.label}
            {item.count === undefined ? null : (
              <span className="ms-1.5 text-sm text-ink-2">{item.count}</span>
            )}
          </Primitive.Trigger>
        ))}
      </Primitive.List>
      {items.map((item) => (
        <Primitive.Content key={item.id} value={item.id} className="pt-4">
          {item.content}
        </Primitive.Content>
      ))}
    </Primitive.Root>
  );
}
