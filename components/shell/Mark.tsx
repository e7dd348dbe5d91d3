/** The mark: two pole shoes facing each other with five straight field lines between. Beside the name it is silent. */
export function Mark({ label }: { label?: string }) {
  return (
    <svg viewBox="0 0 48 48" role={label ? 'img' : undefined} aria-label={label} aria-hidden={label ? undefined : true} focusable="false">
      <path fill="var(--enamel)" d="M1 16h6V5h12a32 32 0 0 0 0 38H7V32H1zM47 16h-6V5H29a32 32 0 0 1 0 38h12V32h6z" />
      <path fill="none" stroke="var(--ink)" strokeWidth={2.5} d="M18.5 10h11M16.25 17h15.5M15.5 24h17M16.25 31h15.5M18.5 38h11" />
    </svg>
  );
}

/** Mark and name, leading home. */
export function Brand({ href = '/', school }: { href?: string; school?: string }) {
  return (
    <a className="brand" href={href}>
      <Mark />
      <span>Fullfield</span>
      {school && <span className="school">{school}</span>}
    </a>
  );
}
