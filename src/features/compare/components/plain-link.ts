/** Look of a link or link-like button inside a table or a line of text. */
export const plainLink =
  "inline-block min-h-6 underline decoration-rule underline-offset-4 hover:decoration-kelp";
