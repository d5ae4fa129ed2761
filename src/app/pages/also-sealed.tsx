import { type ComponentType, lazy, Suspense, useId } from "react";
import type { SealedMethods as Methods, SealedAlso } from "../../../shared/schemas/referee-copy.ts";
import { SealedMatrix } from "../../cells/slutsky/sealed-matrix.tsx";
import { SealedVerdicts } from "../../cells/slutsky/sealed-verdicts.tsx";
import { SealedMethods } from "./sealed-methods.tsx";

/** A view by its promise, as a part that is loaded when it is first shown. */
const later = <P extends object>(load: () => Promise<ComponentType<P>>) =>
  lazy(async () => ({ default: await load() }));

const SystemOpen = later(async () => (await import("../../cells/system/view.tsx")).SystemOpen);
const TestsOpen = later(async () => (await import("../../cells/tests/view.tsx")).TestsOpen);
const ElasticitiesOpen = later(async () => (await import("../../cells/elasticities/view.tsx")).ElasticitiesOpen);

const SealedText = later(async () => (await import("../../cells/text/sealed-text.tsx")).SealedText);

interface AlsoSealedProps {
  readonly also: readonly SealedAlso[];
  readonly methods: readonly Methods[];
}

/** Further findings of a sealed copy, as the study shows them, then the methods of its systems. */
export function AlsoSealed({ also, methods }: AlsoSealedProps) {
  return (
    <>
      <p className="type-small border-line border-t pt-4 text-ink2">
        Sealed with the matrix. Matrices and tables of coefficients are computed again with it; what else stands here
        stands as it was sealed.
      </p>
      {also.map((one) => (
        <OneSealed key={one.name} one={one} />
      ))}
      <SealedMethods methods={methods} />
    </>
  );
}

function OneSealed({ one }: { one: SealedAlso }) {
  const id = useId();
  return (
    <section aria-labelledby={id} className="border-line border-t pt-4">
      <h2 id={id} className="mb-3">
        <span className="type-cell-name">{one.name}</span> <i className="type-kind">{one.kind}</i>
      </h2>
      <Suspense fallback={<p className="text-ink2">Opening {one.name}</p>}>
        <Finding one={one} />
      </Suspense>
    </section>
  );
}

function Finding({ one }: { one: SealedAlso }) {
  switch (one.kind) {
    case "system":
      return <SystemOpen finding={one.finding} />;
    case "tests":
      return <TestsOpen finding={one.finding} />;
    case "elasticities":
      return <ElasticitiesOpen finding={one.finding} />;
    case "text":
      return <SealedText finding={one.finding} />;
    case "slutsky":
      return (
        <div className="space-y-7">
          <SealedVerdicts finding={one.finding} />
          <SealedMatrix finding={one.finding} />
        </div>
      );
  }
}
