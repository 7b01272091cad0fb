/** Initials: "Marie Ann Kowal" gives "M. A. K.". */
export function maskName(name: string): string {
  return name
    .split(/\s+/)
    .filter(Boolean)
    .slice(0, 4)
    .map((part) => `${[...part][0]?.toUpperCase() ?? ""}.`)
    .join(" ");
}

/** Last two digits of a telephone number, or null when it has fewer than five. */
export function lastTwo(phone: string): string | null {
  const digits = phone.replace(/\D+/g, "");
  return digits.length >= 5 ? digits.slice(-2) : null;
}

/** First letter and top-level domain: "m…@….org". */
export function maskEmail(email: string): string | null {
  const [local, domain] = email.split("@");
  if (!local || !domain) return null;
  return `${[...local][0]}…@….${domain.split(".").pop()}`;
}
