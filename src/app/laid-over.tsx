import { Component, type ReactNode, Suspense } from "react";
import { Button, Word } from "../components/button.tsx";
import { Fault } from "../components/field.tsx";

interface LaidOverProps {
  readonly onClose: () => void;
  readonly children: ReactNode;
}

/**
 * What is laid over a page and loaded when it is first asked for. Where it cannot be fetched (the installation does not
 * answer, or has another version by now) a note says so, and the page beneath stays as it is.
 */
export class LaidOver extends Component<LaidOverProps, { failed: boolean }> {
  override state = { failed: false };

  static getDerivedStateFromError() {
    return { failed: true };
  }

  override render() {
    const { onClose, children } = this.props;
    if (!this.state.failed) return <Suspense>{children}</Suspense>;
    return (
      <aside
        aria-label="Not fetched"
        className="fixed inset-x-4 bottom-4 z-40 mx-auto max-w-xl border border-ink bg-recto p-4 text-ink"
      >
        <Fault>
          This could not be fetched: the installation does not answer, or has another version by now. What is on the
          page stays; once the installation answers, load the page again.
        </Fault>
        <p className="flex items-center gap-5 pt-3">
          <Button onClick={onClose}>Stay on the page</Button>
          <Word quiet onClick={() => location.reload()}>
            Load the page again
          </Word>
        </p>
      </aside>
    );
  }
}
