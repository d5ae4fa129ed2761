/** Hatching for a region that would break a law, to be named by its id in `fill`. */
export function Hatch({ id, colour = "var(--rule2)" }: { id: string; colour?: string }) {
  return (
    <pattern id={id} width="6" height="6" patternUnits="userSpaceOnUse" patternTransform="rotate(45)">
      <path d="M0 0V6" stroke={colour} strokeWidth="1.2" />
    </pattern>
  );
}
