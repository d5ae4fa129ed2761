interface MarkProps {
  readonly size?: number;
  /** All in ink, where one colour is all there is. */
  readonly plain?: boolean;
}

/** A line touching an arc at one dot. */
export function Mark({ size = 26, plain = false }: MarkProps) {
  return (
    <svg
      aria-hidden="true"
      viewBox="0 0 32 32"
      width={size}
      height={size}
      fill="none"
      strokeWidth="2.5"
      strokeLinecap="round"
      className="shrink-0"
    >
      <path d="M1.9 8.7L23.3 30.1" stroke={plain ? "var(--ink)" : "var(--accent)"} />
      <path d="M14 3.2A10.5 10.5 0 1 0 28.8 18" stroke="var(--ink)" />
      <circle cx="12.6" cy="19.4" r="3.4" fill="var(--ink)" />
    </svg>
  );
}
