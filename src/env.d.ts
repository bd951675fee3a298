/// <reference types="astro/client" />

declare namespace App {
  interface Locals {
    app: import('@/server/runtime').Runtime;
    log: import('pino').Logger;
    requestId: string;
    /** For rate limits: the proxy's word when one is trusted, else `direct`. */
    address: string;
    actor: import('@/server/auth/actor').Actor | null;
    sessionCookie: string | undefined;
  }
}
