import 'katex/dist/katex.min.css';

/**
 * Text of a template, made into HTML by the server's Markdown and KaTeX (no HTML of a person's passes through,
 * KaTeX with `trust: false`). The only place that sets inner HTML: `html` must come from there. `inline` for an
 * option or a question's line.
 */
export function MathText({ html, inline, id }: { html: string; inline?: boolean; id?: string }) {
  const inner = { __html: html };
  return inline ? <span id={id} dangerouslySetInnerHTML={inner} /> : <div id={id} className="prose" dangerouslySetInnerHTML={inner} />;
}
