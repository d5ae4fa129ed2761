import { useInstallation } from "./api/get-installation.ts";

/** After a link has been asked for; the same words whatever the address belongs to. */
export function LinkSent({ email, what }: { email: string; what: string }) {
  const { data } = useInstallation();
  return (
    <div role="status">
      <p className="type-finding">
        A message is on its way to <span className="break-words">{email}</span>. {what}
      </p>
      {data?.mail === "post box" && (
        <p className="type-small pt-3 text-ink2">
          This installation sends nothing out: its messages lie in a local post box, which its administrator reads.
        </p>
      )}
    </div>
  );
}
