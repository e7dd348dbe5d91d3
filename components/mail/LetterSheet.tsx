import { Pairs } from '@/components/ui/Pairs';

type LetterSheetProps = {
  head: readonly { label: string; value: string }[];
  /** Plain text as it was sent. */
  text: string;
  /** Address of this installation: links to it can be followed, others stay text. */
  home: string;
  files: readonly { name: string; type: string; bytes: number; href: string }[];
};

const address = /(https?:\/\/[^\s<>"]+)/g;

function Linked({ text, home }: { text: string; home: string }) {
  return text.split(address).map((piece, place) =>
    piece.startsWith(`${home}/`) ? (
      <a key={place} href={piece}>
        {piece}
      </a>
    ) : (
      piece
    ),
  );
}

/** One message: where it came from, its text, its files. */
export function LetterSheet({ head, text, home, files }: LetterSheetProps) {
  return (
    <article className="sheet">
      <Pairs pairs={head} />
      <p className="mt-6 max-w-measure whitespace-pre-wrap break-words">
        <Linked text={text} home={home} />
      </p>
      {files.length > 0 && (
        <>
          <h2 className="mt-6">Files</h2>
          <ul>
            {files.map((file) => (
              <li key={file.href}>
                <a href={file.href} download>
                  {file.name}
                </a>{' '}
                ({file.type}, {Math.max(1, Math.round(file.bytes / 1024))} kB)
              </li>
            ))}
          </ul>
        </>
      )}
    </article>
  );
}
