'use client';

import { useQuery } from '@tanstack/react-query';
import { useEffect, useState } from 'react';
import { MathText } from '@/components/ui/MathText';
import { examKeys, fetchMarkdown } from '@/lib/exams/client';

/** The latest value that stood still for `pause` ms. */
function useSettled(value: string, pause: number): string {
  const [settled, setSettled] = useState(value);
  useEffect(() => {
    const timer = setTimeout(() => setSettled(value), pause);
    return () => clearTimeout(timer);
  }, [value, pause]);
  return settled;
}

/** How a text with formulas is printed, a moment after it was typed. */
export function MarkdownPreview({ label, text }: { label: string; text: string }) {
  const settled = useSettled(text, 400);
  const { data, error } = useQuery({
    queryKey: examKeys.markdown(settled), queryFn: ({ signal }) => fetchMarkdown(settled, signal), enabled: settled.trim() !== '', placeholderData: (before) => before, staleTime: Infinity,
  });
  if (settled.trim() === '') return null;
  return (
    <details>
      <summary className="cursor-pointer text-15 font-medium">{label}</summary>
      <div className="mt-2 border-l-2 border-rule pl-4">
        {error ? <p className="text-15 text-ink-soft">{error.message}</p> : data ? <MathText html={data.html} /> : <p className="text-15 text-ink-soft">Printing…</p>}
      </div>
    </details>
  );
}
