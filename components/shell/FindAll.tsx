'use client';

import Link from 'next/link';
import { useEffect, useRef, useState, type KeyboardEvent as ReactKeyboardEvent } from 'react';
import { Dialog } from '@/components/ui/Dialog';

/** kind: what it is, in the school's words ("template", "sitting", "person"). */
export type FindHit = { href: string; title: string; kind: string };

const pause = 200;

/** Asks `address?q=…`, which answers `{ hits: FindHit[] }`, once typing rests; an older answer never overtakes a newer. */
function useHits(address: string, wanted: string): { hits: readonly FindHit[]; failed: boolean; asked: string } {
  const [answer, setAnswer] = useState<{ hits: readonly FindHit[]; failed: boolean; asked: string }>({ hits: [], failed: false, asked: '' });
  useEffect(() => {
    const text = wanted.trim();
    if (text.length < 2) return;
    const stop = new AbortController();
    const timer = setTimeout(() => {
      fetch(`${address}?q=${encodeURIComponent(text)}`, { signal: stop.signal, headers: { accept: 'application/json' } })
        .then(async (reply) => {
          if (!reply.ok) throw new Error(`search answered ${reply.status}`);
          const body = (await reply.json()) as { hits: FindHit[] };
          setAnswer({ hits: body.hits, failed: false, asked: text });
        })
        .catch(() => {
          if (!stop.signal.aborted) setAnswer({ hits: [], failed: true, asked: text });
        });
    }, pause);
    return () => {
      clearTimeout(timer);
      stop.abort();
    };
  }, [address, wanted]);
  return wanted.trim().length < 2 ? { hits: [], failed: false, asked: '' } : answer;
}

function Hits({ address, wanted, onGo }: { address: string; wanted: string; onGo: () => void }) {
  const { hits, failed, asked } = useHits(address, wanted);
  const says = failed ? 'The search did not answer. Try again.' : asked === '' ? 'Write two letters or more.' : hits.length === 0 ? `Nothing is called “${asked}”.` : `${hits.length} found`;
  return (
    <>
      <p className="help" role="status">
        {says}
      </p>
      <ul className="find-hits">
        {hits.map((hit) => (
          <li key={hit.href}>
            <Link href={hit.href} onClick={onGo}>
              <span className="strong">{hit.title}</span>
              <span className="soft">{hit.kind}</span>
            </Link>
          </li>
        ))}
      </ul>
    </>
  );
}

/** Search over everything one may see: Ctrl K or Cmd K, or the words in the bar. Arrows move among what was found. */
export function FindAll({ address }: { address: string }) {
  const [open, setOpen] = useState(false);
  const [wanted, setWanted] = useState('');
  const box = useRef<HTMLDivElement>(null);
  useEffect(() => {
    const onKey = (event: KeyboardEvent) => {
      if (event.key.toLowerCase() !== 'k' || !(event.ctrlKey || event.metaKey) || event.altKey || event.shiftKey) return;
      event.preventDefault();
      setOpen(true);
    };
    document.addEventListener('keydown', onKey);
    return () => document.removeEventListener('keydown', onKey);
  }, []);
  const onArrows = (event: ReactKeyboardEvent) => {
    const step = { ArrowDown: 1, ArrowUp: -1 }[event.key];
    if (step === undefined) return;
    event.preventDefault();
    const stops = [...(box.current?.querySelectorAll<HTMLElement>('input, a') ?? [])];
    const at = stops.findIndex((stop) => stop === document.activeElement);
    stops[Math.max(0, Math.min(stops.length - 1, at + step))]?.focus();
  };
  return (
    <>
      <button type="button" className="find-all" aria-keyshortcuts="Control+K Meta+K" onClick={() => setOpen(true)}>
        Search <kbd className="kbd">Ctrl K</kbd>
      </button>
      <Dialog open={open} onClose={() => setOpen(false)} title="Search">
        <div ref={box} onKeyDown={onArrows}>
          <input type="search" className="input" aria-label="Search for" data-first="true" value={wanted} onChange={(event) => setWanted(event.target.value)} />
          <Hits address={address} wanted={wanted} onGo={() => setOpen(false)} />
        </div>
      </Dialog>
    </>
  );
}
