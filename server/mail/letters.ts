/** A letter that waits: who gets it, and the token it carries. It lies sealed until it is sent. */
export type LetterOrder =
  | { kind: "invitation"; to: string; token: string }
  | { kind: "reset"; to: string; token: string }
  | { kind: "password_changed"; to: string };

/** Page and lines of each kind. No name, no investigation, nothing of any person. */
const WORDS: Record<LetterOrder["kind"], { subject: string; page: string; lines: string[] }> = {
  invitation: {
    subject: "You are invited to Strandline",
    page: "/invitation",
    lines: [
      "A team that works with Strandline invites you.",
      "Open this link within 72 hours; it works once:",
      "",
      "LINK",
      "",
      "If you do not expect it, leave it alone; nothing happens then.",
    ],
  },
  reset: {
    subject: "Choose a new Strandline password",
    page: "/new-password",
    lines: [
      "Somebody asked for a new password for the account with this address.",
      "Open this link within 20 minutes to choose one; it works once:",
      "",
      "LINK",
      "",
      "If it was not you, leave it alone; your password stays as it is.",
    ],
  },
  password_changed: {
    subject: "Your Strandline password was changed",
    page: "/forgotten-password",
    lines: [
      "The password of the account with this address was changed, and its other sessions ended.",
      "If it was not you, choose a new one at once:",
      "",
      "LINK",
    ],
  },
};

/**
 * Subject and text of a letter. The token stands behind the `#`, which no browser sends to any
 * server and no log keeps.
 *
 * @param base origin of this installation, from its settings and never from a request
 */
export function writeLetter(order: LetterOrder, base: string): { subject: string; text: string } {
  const { subject, page, lines } = WORDS[order.kind];
  const link = `${base}${page}${"token" in order ? `#${order.token}` : ""}`;
  return {
    subject,
    text: `${lines.map((line) => (line === "LINK" ? link : line)).join("\n")}\n`,
  };
}
