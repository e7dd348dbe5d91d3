'use client';

import { useRouter } from 'next/navigation';
import { useEffect } from 'react';
import { useConfirm } from './Confirm';

const leave = {
  title: 'Leave without saving?',
  says: 'What you typed on this page is not saved yet and goes when you leave.',
  verb: 'Leave',
  keep: 'Stay on the page',
};

/** The link that a plain press would follow inside this application, or null. */
function linkOf(event: MouseEvent): URL | null {
  if (event.defaultPrevented || event.button !== 0 || event.metaKey || event.ctrlKey || event.shiftKey || event.altKey) return null;
  const link = event.target instanceof Element ? event.target.closest('a') : null;
  if (!link || !link.href || link.target || link.hasAttribute('download')) return null;
  const to = new URL(link.href);
  const samePage = to.origin === location.origin && to.pathname === location.pathname && to.search === location.search;
  return samePage ? null : to;
}

/** While `dirty`, leaving the page asks first: by a link with our question, by closing or reloading with the browser's. */
export function FormGuard({ dirty }: { dirty: boolean }) {
  const router = useRouter();
  const [ask, question] = useConfirm();
  useEffect(() => {
    if (!dirty) return;
    let leaving = false;
    const onUnload = (event: BeforeUnloadEvent) => {
      if (!leaving) event.preventDefault();
    };
    const onClick = (event: MouseEvent) => {
      const to = linkOf(event);
      if (!to || leaving) return;
      event.preventDefault();
      event.stopPropagation();
      void ask(leave).then((yes) => {
        if (!yes) return;
        leaving = true;
        if (to.origin === location.origin) router.push(to.pathname + to.search + to.hash);
        else location.assign(to.href);
      });
    };
    window.addEventListener('beforeunload', onUnload);
    // On the window and first, so that the router's own handler does not run before the answer.
    window.addEventListener('click', onClick, true);
    return () => {
      window.removeEventListener('beforeunload', onUnload);
      window.removeEventListener('click', onClick, true);
    };
  }, [dirty, ask, router]);
  return question;
}
