/** One mail before it becomes text and HTML. Every string is plain text; the renderers escape. */
export interface Letter {
  readonly subject: string;
  /** Says the state, like a screen's heading. */
  readonly heading: string;
  readonly blocks: readonly Block[];
  readonly action?: { readonly label: string; readonly url: string };
  /** Who writes, under the text: the school, or the app itself. */
  readonly sender: string;
}

export type Block =
  | { readonly kind: 'paragraph'; readonly text: string }
  | { readonly kind: 'list'; readonly items: readonly string[] }
  /** Facts with their values lined up at the right: "Deposit held", "€60.00". */
  | { readonly kind: 'facts'; readonly rows: readonly (readonly [name: string, value: string])[] };

export const paragraph = (text: string): Block => ({ kind: 'paragraph', text });
export const list = (items: readonly string[]): Block => ({ kind: 'list', items });
export const facts = (rows: readonly (readonly [string, string])[]): Block => ({ kind: 'facts', rows });
