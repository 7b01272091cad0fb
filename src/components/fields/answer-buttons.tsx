/** Answers that are no value: asked and not known, or asked and not told. */
export type NoAnswer = "unknown" | "refused";

export type AnswerButtonsProps = {
  /** Name of the field they belong to, for readers: "onset". */
  fieldLabel: string;
  value: string;
  /** Given the word, or "" (not asked) when the pressed one is pressed again. */
  onChoose: (value: NoAnswer | "") => void;
  disabled?: boolean;
};

/** The two explicit answers beside a box. An empty box means "not asked", which is a third thing. */
export function AnswerButtons({ fieldLabel, value, onChoose, disabled }: AnswerButtonsProps) {
  return (
    <span className="inline-flex shrink-0">
      {(["unknown", "refused"] as const).map((word) => (
        <button
          key={word}
          type="button"
          disabled={disabled}
          aria-pressed={value === word}
          aria-label={`${fieldLabel}: ${word}`}
          onClick={() => onChoose(value === word ? "" : word)}
          className="min-h-9 border border-s-0 border-ink-2 px-2 text-sm text-ink-2
            hover:bg-paper-2 hover:text-ink aria-pressed:bg-ink aria-pressed:text-paper
            pointer-coarse:min-h-11"
        >
          {word}
        </button>
      ))}
    </span>
  );
}
