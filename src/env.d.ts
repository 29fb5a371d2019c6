/// <reference types="astro/client" />

declare namespace App {
  interface Locals {
    /** Goes into every log line and every problem document of this request. */
    requestId: string;
    /** Who is signed in, and in which workshop; null for a visitor. */
    signedIn: import('@/lib/server/auth/guard').SignedIn | null;
    /** The theme the visitor chose; `auto` follows the device. */
    theme: import('@/lib/theme').Theme;
    /** What the form before this page did. */
    flash: import('@/lib/server/flash').Flash | null;
    /** Why a page was refused, for the page that says so. */
    refusal?: { readonly status: number; readonly text: string };
  }
}
