/** Text that is already HTML, as told apart from text that still has to be escaped. */
export interface Html {
  html: string;
}

const entities: Readonly<Record<string, string>> = { '&': '&amp;', '<': '&lt;', '>': '&gt;', '"': '&quot;', "'": '&#39;' };

/** Builds HTML from a template; every value that is not itself `Html` is escaped, null and false vanish. */
export function html(strings: TemplateStringsArray, ...values: readonly (Html | readonly Html[] | string | number | null | false)[]): Html {
  let text = strings[0] ?? '';
  values.forEach((value, index) => {
    text += toText(value) + (strings[index + 1] ?? '');
  });
  return { html: text };
}

function toText(value: Html | readonly Html[] | string | number | null | false): string {
  if (value === null || value === false) return '';
  if (typeof value === 'string' || typeof value === 'number') return String(value).replace(/[&<>"']/g, (char) => entities[char] ?? char);
  return 'html' in value ? value.html : value.map((part) => part.html).join('\n');
}
