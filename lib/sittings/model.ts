export const sittingStates = ['planned', 'check-in', 'running', 'paused', 'closed', 'reconciled', 'cancelled', 'abandoned'] as const;
export type SittingState = (typeof sittingStates)[number];

export const sittingEvents = ['open-check-in', 'start', 'pause', 'resume', 'close', 'reconcile', 'cancel', 'abandon'] as const;
export type SittingEvent = (typeof sittingEvents)[number];

/** What a sitting's own rules look at. */
export type SittingFacts = { state: SittingState; papersDrawn: boolean; opensAt: Date; startsAt: Date };
