import { Fault } from "../../components/field.tsx";
import { sentenceOf } from "../../lib/api.ts";
import { dateInWords } from "../../lib/dates.ts";
import { writeNumber } from "../../lib/formats.ts";
import { useAccounts } from "./api/administration.ts";

/** Who has an account, newest first; nothing of their studies but how many there are. */
export function AccountTable() {
  const { data: accounts, error } = useAccounts();
  if (error && !accounts) return <Fault>{sentenceOf(error)}</Fault>;
  if (!accounts) return <p role="status">Fetching the accounts</p>;
  return (
    <ul className="border-line border-b">
      {accounts.map((account) => (
        <li
          key={account.id}
          className="grid items-baseline gap-x-8 border-line border-t py-2.5 sm:grid-cols-[minmax(0,1fr)_auto]"
        >
          <div className="min-w-0">
            <p className="font-semibold">{account.name}</p>
            <p className="type-small break-words text-ink2">
              {account.email}
              {!account.isConfirmed && ", not confirmed"}
            </p>
          </div>
          <p className="type-small text-ink2">
            In {account.studies === 1 ? "one study" : `${writeNumber(account.studies)} studies`}, since{" "}
            {dateInWords(account.since)}
          </p>
        </li>
      ))}
    </ul>
  );
}
