/// <reference types="astro/client" />

type SignedInUser = import('#lib/auth/sessions').SignedInUser;

declare namespace App {
  interface Locals {
    /** The signed-in person, from the session cookie or an access token. */
    user: SignedInUser | null;
    requestId: string;
    /** The colours that the person chose; null: as the device has it. */
    theme: 'light' | 'dark' | null;
  }
}
