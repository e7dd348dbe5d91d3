import { LinkButton } from '@/components/ui/LinkButton';

export type FormLine = { id: string; number: number; title: string; approved: string; approvedBy: string; digest: string; sittings: number };

/** The forms frozen from an exam, newest first. `approved` is a printed date. */
export function FormList({ forms }: { forms: readonly FormLine[] }) {
  return (
    <section className="section section--cap" aria-labelledby="forms-head">
      <h2 id="forms-head">Forms</h2>
      <ul>
        {forms.map((form) => (
          <li key={form.id} className="border-b border-rule py-3">
            <span className="flex items-center justify-between gap-3">
              <b className="font-medium">Form {form.number}</b>
              <LinkButton href={`/sittings/new?form=${form.id}`} size="dense">Schedule</LinkButton>
            </span>
            <span className="block text-13 text-ink-soft">
              Approved {form.approved} by {form.approvedBy} · {form.sittings === 1 ? '1 sitting' : `${form.sittings} sittings`}
            </span>
            <span className="block text-13 text-ink-soft">Digest <span className="num">{form.digest.slice(0, 16)}</span></span>
          </li>
        ))}
        {forms.length === 0 && <li className="py-3 text-15 text-ink-soft">None yet: approval freezes the first.</li>}
      </ul>
    </section>
  );
}
