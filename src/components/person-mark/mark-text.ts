import { formatShare } from "../../lib/formatters.ts";
import type { PersonMarkInput } from "./person-mark-input.ts";

const words: Record<PersonMarkInput["classification"], string> = {
  confirmed: "confirmed case",
  probable: "probable case",
  suspected: "suspected case",
  not_a_case: "not a case",
  contact: "contact",
};

/** The text alternative of a mark: everything it shows, in words. */
export function markText(input: PersonMarkInput): string {
  const parts = [words[input.classification]];
  const { followUp } = input;
  if (input.classification === "contact" && followUp) {
    if (followUp.state === "completed") parts.push("follow-up completed");
    else if (followUp.state === "lost") parts.push("lost to follow-up");
    else if (followUp.state === "ended") parts.push("follow-up ended before its last day");
    else parts.push(`${formatShare(followUp.share)} of follow-up done`);
  } else if (input.wasContact && input.classification !== "contact") {
    parts.push("was a contact before");
  }
  if (input.groupLabel) parts.push(input.groupLabel);
  return parts.join(", ");
}
