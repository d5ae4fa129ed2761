/** A message's words, its addresses of pages as links. */
export function LetterText({ text }: { text: string }) {
  return (
    <p className="type-prose mt-2 max-w-[40rem] whitespace-pre-wrap break-words border-rule2 border-l pl-4">
      {text.split(/(https?:\/\/\S+)/).map((words, index) =>
        index % 2 === 1 ? (
          <a key={index} className="reference" href={words}>
            {words}
          </a>
        ) : (
          words
        ),
      )}
    </p>
  );
}
