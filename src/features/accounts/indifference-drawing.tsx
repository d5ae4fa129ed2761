import { budgetPath, indifferencePath, type Plane, type Preferences } from "./indifference-curves.ts";

const PLANE: Plane = { width: 800, height: 1000 };
const PREFERENCES: Preferences = { share: 0.51, choice: { x: 398, y: 390 } };
const WORSE = [0.28, 0.4, 0.52, 0.64, 0.76, 0.88];
const BETTER = [1.12, 1.24, 1.36, 1.48, 1.6, 1.72, 1.84, 1.96, 2.08];

/** Indifference curves, a budget line, and the bundle where they touch: drawn from the preferences themselves. */
export function IndifferenceDrawing() {
  return (
    <svg
      aria-hidden="true"
      viewBox={`0 0 ${PLANE.width} ${PLANE.height}`}
      preserveAspectRatio="xMidYMid slice"
      className="absolute inset-0 h-full w-full"
      fill="none"
    >
      {[...WORSE, ...BETTER].map((scale) => (
        <path key={scale} d={indifferencePath(PREFERENCES, PLANE, scale)} stroke="var(--rule2)" strokeWidth="1.1" />
      ))}
      <path d={indifferencePath(PREFERENCES, PLANE, 1)} stroke="var(--ink)" strokeWidth="2.6" />
      <path d={budgetPath(PREFERENCES, PLANE)} stroke="var(--accent)" strokeWidth="2.8" />
      <circle cx={PREFERENCES.choice.x} cy={PLANE.height - PREFERENCES.choice.y} r="9.5" fill="var(--ink)" />
    </svg>
  );
}
