import { ActionButton } from '@/components/forms/ActionButton';
import { Sign } from '@/components/ui/Sign';
import type { AccommodationRow } from '@/lib/accommodations/model';
import type { Result } from '@/lib/result';

type Props = {
  rows: readonly AccommodationRow[];
  today: string;
  /** Prints a day. */
  date: (day: string) => string;
  end: (id: string) => Promise<Result<null>>;
};

/** Whether it holds on a day, in a shape and a word. */
function Holds({ row, today }: { row: AccommodationRow; today: string }) {
  if (row.endedAt !== null || (row.until !== null && row.until < today)) return <Sign shape="cross" tone="none">ended</Sign>;
  return row.since > today ? <Sign shape="ring-dashed" tone="none">to come</Sign> : <Sign shape="check" tone="ok">in force</Sign>;
}

/** A person's accommodations with reasons: for registrars. */
export function AccommodationList({ rows, today, date, end }: Props) {
  if (rows.length === 0) return <p className="text-15 text-ink-soft">None is given.</p>;
  return (
    <ul className="grid">
      {rows.map((row) => (
        <li key={row.id} className="grid gap-1 border-b border-rule py-3 text-15">
          <div className="flex flex-wrap items-baseline justify-between gap-x-4">
            <span className="font-medium">{row.need}</span>
            <Holds row={row} today={today} />
          </div>
          <span className="text-ink-soft">
            From {date(row.since)}
            {row.until ? ` until ${date(row.until)}` : ', without an end'}; given by {row.givenBy}
          </span>
          {row.reason && <span>Reason: {row.reason}</span>}
          {row.endedAt === null && (row.until === null || row.until >= today) && (
            <ActionButton
              dense
              label="End it"
              run={end.bind(null, row.id)}
              confirm={{ title: `End the accommodation ${row.need}?`, says: 'It stays on record. Sittings planned from now on do not count it; those planned before are set right on their page.', verb: 'End it' }}
            />
          )}
        </li>
      ))}
    </ul>
  );
}
