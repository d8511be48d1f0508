/// <reference types="astro/client" />

declare namespace App {
  interface Locals {
    /** Who is asking; set by src/middleware.ts for every page and route. */
    caller: import('./server/access.ts').Caller;
    /** `paper`, `dim`, or null when the system's setting decides. */
    theme: 'paper' | 'dim' | null;
    requestId: string;
    /** Why the page that was asked for is not shown; read by src/pages/refused.astro. */
    refusal?: import('./server/errors.ts').ApiError;
  }
}
