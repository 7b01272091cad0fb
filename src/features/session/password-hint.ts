/** Beside every box for a new password. */
export const passwordHint =
  "At least 15 characters; a few words of your own are fine, your name and common words alone are not.";
