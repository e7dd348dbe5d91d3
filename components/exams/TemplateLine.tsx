import { Button } from '@/components/ui/Button';
import { Sign } from '@/components/ui/Sign';
import { kindsInWords } from '@/lib/bank/model';
import type { VersionFacts } from '@/lib/exams/model';

export type LineAct = 'up' | 'down' | 'out' | { versionId: string };
type Props = {
  number: number;
  version: VersionFacts | undefined;
  areas: Readonly<Record<string, string>>;
  locked: boolean;
  ends: { first: boolean; last: boolean };
  onDo: (what: LineAct) => void;
};

function Standing({ version }: { version: VersionFacts }) {
  if (!version.usable) return <Sign shape="cross" tone="stop" small>version {version.number} is not approved</Sign>;
  return <span className="text-13 text-ink-soft">version {version.number}</span>;
}

/** One question of a section: what it is, what it counts, and where it stands. */
export function TemplateLine({ number, version, areas, locked, ends, onDo }: Props) {
  const newer = version?.newer;
  return (
    <li className="flex flex-wrap items-center gap-x-4 gap-y-1 border-b border-rule py-2">
      <span className="num w-8 text-ink-soft">{number}</span>
      <span className="min-w-0 flex-1 basis-64">
        <span className="block font-medium">{version?.title ?? 'A template that is no longer in the bank'}</span>
        {version && (
          <span className="text-13 text-ink-soft">
            {areas[version.area] ?? version.area}, level {version.level} · {kindsInWords(version.kinds)} · <Standing version={version} />
          </span>
        )}
      </span>
      {version && <span className="num text-right">{version.marks} <span className="font-sans text-13 text-ink-soft">{version.marks === 1 ? 'mark' : 'marks'}</span></span>}
      {version && <span className="num w-20 text-right">{version.minutes} <span className="font-sans text-13 text-ink-soft">min</span></span>}
      {!locked && (
        <span className="btn-row">
          {newer && <Button size="dense" onClick={() => onDo({ versionId: newer.versionId })}>Take version {newer.number}</Button>}
          <Button size="dense" look="quiet" disabled={ends.first} aria-label={`Question ${number} up`} onClick={() => onDo('up')}>Up</Button>
          <Button size="dense" look="quiet" disabled={ends.last} aria-label={`Question ${number} down`} onClick={() => onDo('down')}>Down</Button>
          <Button size="dense" look="quiet" aria-label={`Take question ${number} out`} onClick={() => onDo('out')}>Take out</Button>
        </span>
      )}
    </li>
  );
}
