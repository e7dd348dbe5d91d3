/** Revisions that one request may bring. In a file of its own: the exam room needs it, and no schema library with it. */
export const mostRevisionsAtOnce = 100;
