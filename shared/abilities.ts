/** What may be done with a record; sent beside it as `can`, so that the client never compares roles. */
export const ABILITIES = ["edit", "interview", "addTest", "seeNetwork"] as const;
export type Ability = (typeof ABILITIES)[number];
export type Can = Partial<Record<Ability, boolean>>;
