/** For the moment before a page is there. */
export function Waiting() {
  return (
    <p role="status" className="p-6 text-ink2">
      Opening
    </p>
  );
}
