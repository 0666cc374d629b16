import { permissions } from '@shared/permissions';
import { operationOf, type AnyRoute } from './route';

/** The readable page of the interface at `/api`: one self-contained document, no scripts and nothing from elsewhere. */
export function apiPage(routes: readonly AnyRoute[]): string {
  const groups = new Map<string, AnyRoute[]>();
  for (const declared of routes) {
    const group = declared.path.split('/')[1] ?? '';
    groups.set(group, [...(groups.get(group) ?? []), declared]);
  }
  const sections = [...groups].map(([name, members]) => section(name, members)).join('\n');
  return `<!doctype html>
<html lang="en"><head><meta charset="utf-8"><meta name="viewport" content="width=device-width, initial-scale=1">
<title>Trayward interface</title>
<style>
  :root { color-scheme: light dark; font: 1rem/1.5 system-ui, sans-serif; }
  body { max-width: 60rem; margin: 2rem auto; padding: 0 1rem; }
  h2 { margin-top: 2rem; text-transform: capitalize; }
  code { font-family: ui-monospace, monospace; }
  li { margin: .75rem 0; } ul { list-style: none; padding: 0; }
  small { display: block; }
</style></head>
<body>
<h1>Trayward interface, version 1</h1>
<p>Every address stands below <code>/api/v1</code>. The machine-readable document is <a href="/api/openapi.json">openapi.json</a>.</p>
<p>Sign in with <code>POST /sessions</code> and send the access token as <code>Authorization: Bearer …</code>. Name the current school in
<code>X-School</code> when you belong to several. Routes marked <em>key</em> need an <code>Idempotency-Key</code>: a new one for each thing done,
the same one for each retry. Errors are problem documents (RFC 9457) with a <code>code</code> for machines and a <code>detail</code> for people.</p>
${sections}
</body></html>
`;
}

function section(name: string, members: readonly AnyRoute[]): string {
  return `<section><h2>${escape(name)}</h2><ul>${members.map(entry).join('')}</ul></section>`;
}

function entry(declared: AnyRoute): string {
  const { permission, response, request, idempotent } = declared;
  const who = permission === 'public' ? 'anybody' : permission === 'signed-in' ? 'anybody signed in' : permissions[permission].join(', ');
  const details = [
    `for ${who}`,
    idempotent ? '<em>key</em>' : '',
    request ? `takes <code>${escape(request.name)}</code>` : '',
    response.kind === 'nothing' ? 'answers with no body' : `answers <code>${escape(response.name)}</code>`,
  ];
  return `<li><code>${escape(operationOf(declared))}</code><br>${escape(declared.summary)}<small>${details.filter(Boolean).join(' · ')}</small></li>`;
}

function escape(text: string): string {
  return text.replaceAll('&', '&amp;').replaceAll('<', '&lt;').replaceAll('>', '&gt;').replaceAll('"', '&quot;');
}
