'use client';

import { useMemo, useState } from 'react';
import { Button } from '@/components/ui/Button';
import { Dialog } from '@/components/ui/Dialog';
import { SelectBox } from '@/components/ui/Select';
import { kindsInWords } from '@/lib/bank/model';
import type { VersionFacts } from '@/lib/exams/model';

type Props = {
  open: boolean;
  onClose: () => void;
  versions: ReadonlyMap<string, VersionFacts>;
  areas: Readonly<Record<string, string>>;
  /** Templates that stand on the exam already. */
  taken: ReadonlySet<string>;
  onTake: (versions: VersionFacts[]) => void;
};

const folded = (text: string) => text.normalize('NFD').replace(/\p{M}/gu, '').toLowerCase();
type Filter = { words: string; area: string; level: string };

function fits(version: VersionFacts, filter: Filter, area: string): boolean {
  const text = folded(`${version.title} ${version.slug} ${area}`);
  return folded(filter.words).split(/\s+/).every((word) => text.includes(word)) && (filter.area === '' || version.area === filter.area) && (filter.level === '' || String(version.level) === filter.level);
}

function Filters({ filter, onFilter, areas, levels }: { filter: Filter; onFilter: (filter: Filter) => void; areas: [string, string][]; levels: number[] }) {
  return (
    <div className="flex flex-wrap gap-2">
      <input type="search" className="input min-w-0 flex-1 basis-48" aria-label="Find a title" placeholder="Find a title" value={filter.words} onChange={(event) => onFilter({ ...filter, words: event.target.value })} />
      <SelectBox aria-label="Area" value={filter.area} onChange={(event) => onFilter({ ...filter, area: event.target.value })} options={[{ value: '', label: 'Area: all' }, ...areas.map(([value, label]) => ({ value, label }))]} />
      <SelectBox aria-label="Level" value={filter.level} onChange={(event) => onFilter({ ...filter, level: event.target.value })} options={[{ value: '', label: 'Level: all' }, ...levels.map((level) => ({ value: String(level), label: `Level ${level}` }))]} />
    </div>
  );
}

/** The approved templates of the bank, to choose several of at once. */
export function TemplatePicker({ open, onClose, versions, areas, taken, onTake }: Props) {
  const [filter, setFilter] = useState<Filter>({ words: '', area: '', level: '' });
  const [picked, setPicked] = useState<ReadonlySet<string>>(new Set());
  const all = useMemo(() => [...versions.values()].filter((version) => version.usable && !version.newer), [versions]);
  const shown = all.filter((version) => fits(version, filter, areas[version.area] ?? ''));
  const marks = all.reduce((sum, version) => (picked.has(version.versionId) ? sum + version.marks : sum), 0);
  const toggle = (id: string) => setPicked((before) => (before.has(id) ? new Set([...before].filter((one) => one !== id)) : new Set([...before, id])));
  const shut = () => {
    setPicked(new Set());
    onClose();
  };
  const take = () => {
    onTake([...picked].flatMap((id) => versions.get(id) ?? []));
    shut();
  };
  return (
    <Dialog open={open} onClose={shut} title="Choose templates" wide>
      <Filters filter={filter} onFilter={setFilter} areas={Object.entries(areas).filter(([area]) => all.some((version) => version.area === area))} levels={[...new Set(all.map((version) => version.level))].sort()} />
      <ul className="mt-4 max-h-[50vh] overflow-y-auto border-t border-ink" aria-label="Approved templates">
        {shown.map((version) => {
          const on = taken.has(version.templateId);
          return (
            <li key={version.versionId} className="border-b border-rule">
              <label className="check">
                <input type="checkbox" className="tick" checked={on || picked.has(version.versionId)} disabled={on} onChange={() => toggle(version.versionId)} />
                <span className="min-w-0 flex-1">
                  <span className="font-medium">{version.title}</span>
                  <span className="block text-13 text-ink-soft">
                    {areas[version.area] ?? version.area}, level {version.level} · {kindsInWords(version.kinds)} · {version.marks} marks · {version.minutes} min{on ? ' · stands on this exam' : ''}
                  </span>
                </span>
              </label>
            </li>
          );
        })}
        {shown.length === 0 && <li className="py-4 text-15 text-ink-soft">{all.length === 0 ? 'The bank has no approved template yet: have one reviewed first.' : 'No approved template fits.'}</li>}
      </ul>
      <div className="dialog__do">
        <span className="grow text-15 text-ink-soft" role="status">{picked.size} chosen, {marks} marks</span>
        <Button onClick={shut}>Go back</Button>
        <Button look="main" disabled={picked.size === 0} onClick={take}>Take {picked.size || ''}</Button>
      </div>
    </Dialog>
  );
}
