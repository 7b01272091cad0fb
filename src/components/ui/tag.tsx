import { clsx } from "clsx";
import type { ReactNode } from "react";

export type TagTone = "plain" | "kelp" | "coral" | "ochre" | "blue" | "quiet";

const tones: Record<TagTone, string> = {
  plain: "border-ink-2 text-ink",
  kelp: "border-kelp text-kelp",
  coral: "border-coral text-coral",
  ochre: "border-ochre text-ochre",
  blue: "border-blue text-blue",
  quiet: "border-rule text-ink-2",
};

export type TagProps = { tone?: TagTone; children: ReactNode; className?: string };

/** A short word with a hairline round it. The word carries the meaning, the colour only helps. */
export function Tag({ tone = "plain", children, className }: TagProps) {
  return (
    <span
      className={clsx(
        "inline-block whitespace-nowrap rounded-[2px] border px-1.5 text-[0.8125rem] leading-5",
        tones[tone],
        className,
      )}
    >
      {children}
    </span>
  );
}
