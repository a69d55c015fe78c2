'use client';

import { useEffect } from 'react';

declare global {
  var __webpack_nonce__: string | undefined;
}

/** Hands the page's nonce to the dialogs' scroll lock, which writes a style element and looks for it under this name. */
export function StyleNonce({ nonce }: { nonce: string }) {
  useEffect(() => {
    globalThis.__webpack_nonce__ = nonce;
  }, [nonce]);
  return null;
}
