/** The name of the product as it is set in the header and on the sign-in page. */
export function Wordmark({ size = "normal" }: { size?: "normal" | "large" }) {
  return (
    <span
      className={`font-bold tracking-tight text-ink ${size === "large" ? "text-3xl" : "text-xl"}`}
    >
      Strandline
    </span>
  );
}
