/**
 * Who works in a store: part of every query, in front of the row-level security that stands behind it. A `Member`
 * of `auth/guard.ts` is one; so is whoever fills a workshop from the command line.
 */
export interface Insider {
  readonly workshop: { readonly id: string };
  readonly person: { readonly id: string };
}
