/// <reference types="astro/client" />

declare namespace App {
  /** Who is signed in, set by the middleware; all null when nobody is. */
  interface Locals {
    person: {
      readonly id: string;
      readonly name: string;
      readonly email: string;
      readonly display: 'metric' | 'imperial';
    } | null;
    /** The firm they act in. */
    firm: { readonly id: string; readonly name: string } | null;
    role: import('@/api-types/people').Role | null;
    session: { readonly id: string; readonly expiresAt: Date } | null;
  }
}
