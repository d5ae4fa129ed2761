/** A plane of two goods in drawing units, the origin at the lower left. */
export interface Plane {
  readonly width: number;
  readonly height: number;
}

export interface Choice {
  readonly x: number;
  readonly y: number;
}

/**
 * Cobb–Douglas preferences u = a ln x + (1 − a) ln y over a plane, the budget line through `choice`
 * that is tangent there: slope −(a y)/((1 − a) x).
 */
export interface Preferences {
  readonly share: number;
  readonly choice: Choice;
}

/** The curve of the bundles worth `scale` times the chosen one in every good, as an SVG path. */
export function indifferencePath({ share, choice }: Preferences, plane: Plane, scale: number): string {
  const exponent = share / (1 - share);
  const level = choice.y * scale * (choice.x * scale) ** exponent;
  const yAt = (x: number) => level / x ** exponent;
  // From where the curve enters at the top to where it leaves at the right, closer together where it bends.
  const start = (level / plane.height) ** (1 / exponent);
  if (start >= plane.width) return "";
  const steps = 72;
  const points = Array.from({ length: steps + 1 }, (_, k) => {
    const x = start * (plane.width / start) ** (k / steps);
    return `${x.toFixed(1)} ${(plane.height - yAt(x)).toFixed(1)}`;
  });
  return `M${points.join("L")}`;
}

/** The budget line from the left edge to the bottom one, or to where it leaves the plane. */
export function budgetPath({ share, choice }: Preferences, plane: Plane): string {
  const slope = (share * choice.y) / ((1 - share) * choice.x);
  const yAt = (x: number) => choice.y + slope * (choice.x - x);
  const xAt = (y: number) => choice.x + (choice.y - y) / slope;
  const left = Math.max(0, xAt(plane.height));
  const right = Math.min(plane.width, xAt(0));
  return `M${left.toFixed(1)} ${(plane.height - yAt(left)).toFixed(1)}L${right.toFixed(1)} ${(plane.height - yAt(right)).toFixed(1)}`;
}
