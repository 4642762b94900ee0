const NAMES = /\b[A-Z][a-z][A-Za-z]*\b/g;

/** The words of a shape; every name that the page explains further down leads there. */
export function Shape({ text }: Readonly<{ text: string }>) {
  return (
    <span className="font-mono text-sm">
      {piecesOf(text).map(({ at, words, isName }) =>
        isName ? (
          <a key={at} href={`#shape-${words}`} className="inline-flex min-h-6 items-center">
            {words}
          </a>
        ) : (
          words
        ),
      )}
    </span>
  );
}

type Piece = { readonly at: number; readonly words: string; readonly isName: boolean };

function piecesOf(text: string): Piece[] {
  const pieces: Piece[] = [];
  let end = 0;
  for (const { 0: name, index } of text.matchAll(NAMES)) {
    pieces.push({ at: end, words: text.slice(end, index), isName: false }, { at: index, words: name, isName: true });
    end = index + name.length;
  }
  return [...pieces, { at: end, words: text.slice(end), isName: false }];
}
