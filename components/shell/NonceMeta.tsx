'use client';

import { useState } from 'react';

/**
 * The nonce under which this document may add style elements, for client code that makes some. The document's policy stays that of its
 * first load, while a server action draws the layout again with another nonce: so the first one is kept.
 */
export function NonceMeta({ nonce }: { nonce: string }) {
  const [first] = useState(nonce);
  return <meta property="csp-nonce" content={first} />;
}
