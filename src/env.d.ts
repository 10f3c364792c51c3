/// <reference types="astro/client" />

declare namespace App {
  interface Locals {
    /** The signed-in person, from the session cookie or an access token. */
    user: import('#lib/auth/sessions').SignedInUser | null;
    requestId: string;
  }
}
