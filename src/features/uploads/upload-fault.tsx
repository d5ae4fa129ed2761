import { Fault } from "../../components/field.tsx";
import { ApiRefusal, sentenceOf } from "../../lib/api.ts";

const MOST = 6;

/** Why a file will not do: a sentence, then each fault at its row and column. Nothing of the study has changed. */
export function UploadFault({ error, name }: { error: Error; name: string }) {
  const problems =
    error instanceof ApiRefusal ? error.problems.filter(({ sentence }) => sentence !== error.message) : [];
  return (
    <div className="pt-2">
      <Fault>
        {name && <b>{name}: </b>}
        {sentenceOf(error)}
      </Fault>
      {problems.length > 0 && (
        <ul className="type-small pt-1 pl-5 text-ink2">
          {problems.slice(0, MOST).map((problem, index) => (
            <li key={index}>{problem.sentence}</li>
          ))}
          {problems.length > MOST && <li>and {problems.length - MOST} more</li>}
        </ul>
      )}
      <p className="type-small pt-1 pl-5 text-ink3">Nothing was kept of it; the study is as it was.</p>
    </div>
  );
}
