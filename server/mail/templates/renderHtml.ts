import type { Block, Letter } from './letter';

// Mail programs drop scripts, web fonts and most of CSS: one column, inline styles that read well on their own, and a
// small style sheet for the programs that honour a dark scheme. Colours are the app's tokens.
const light = { ground: '#EDF0F1', sheet: '#FFFFFF', ink: '#16141D', soft: '#565B66', rule: '#CFD5DA', action: '#2B2A86' };
const dark = { ground: '#0B0A10', sheet: '#16141D', ink: '#EDF0F1', soft: '#B4BAC4', rule: '#3A3F49', action: '#BDBBF7' };
const fonts = "'Atkinson Hyperlegible Next', 'Segoe UI', Helvetica, Arial, sans-serif";

const styleSheet = `
  :root { color-scheme: light dark; supported-color-schemes: light dark; }
  @media (prefers-color-scheme: dark) {
    .ground { background: ${dark.ground} !important; }
    .sheet { background: ${dark.sheet} !important; }
    .ink { color: ${dark.ink} !important; }
    .soft { color: ${dark.soft} !important; }
    .rule { border-color: ${dark.rule} !important; }
    .action { background: ${dark.action} !important; color: ${dark.ground} !important; }
  }`;

/** The HTML part. Holds no picture, script or outside address other than the letter's one link. */
export function renderHtml(letter: Letter): string {
  return `<!doctype html>
<html lang="en">
<head>
<meta charset="utf-8">
<meta name="viewport" content="width=device-width, initial-scale=1">
<meta name="color-scheme" content="light dark">
<title>${escapeHtml(letter.subject)}</title>
<style>${styleSheet}</style>
</head>
<body class="ground" style="margin:0;background:${light.ground};">
<div class="ground" style="background:${light.ground};padding:24px 12px;font-family:${fonts};font-size:16px;line-height:1.5;">
<div class="sheet ink" style="max-width:560px;margin:0 auto;background:${light.sheet};color:${light.ink};border-radius:14px;padding:24px;">
<h1 class="ink" style="margin:0 0 16px;font-size:24px;line-height:1.25;color:${light.ink};">${escapeHtml(letter.heading)}</h1>
${letter.blocks.map(blockHtml).join('\n')}
${actionHtml(letter)}
<p class="soft rule" style="margin:24px 0 0;padding-top:16px;border-top:1px solid ${light.rule};color:${light.soft};font-size:14.5px;">${escapeHtml(letter.sender)}</p>
</div>
</div>
</body>
</html>
`;
}

function blockHtml(block: Block): string {
  if (block.kind === 'paragraph') return `<p style="margin:0 0 16px;">${escapeHtml(block.text)}</p>`;
  if (block.kind === 'list') {
    const items = block.items.map((item) => `<li style="margin:0 0 4px;">${escapeHtml(item)}</li>`).join('');
    return `<ul style="margin:0 0 16px;padding-left:22px;">${items}</ul>`;
  }
  const rows = block.rows.map(([name, value]) => factHtml(name, value)).join('');
  return `<table role="table" style="width:100%;border-collapse:collapse;margin:0 0 16px;">${rows}</table>`;
}

function factHtml(name: string, value: string): string {
  const line = `padding:8px 0;border-bottom:1px solid ${light.rule};vertical-align:top;`;
  return `<tr><th scope="row" class="soft rule" style="${line}text-align:left;font-weight:400;color:${light.soft};">${escapeHtml(name)}</th>` +
    `<td class="rule" style="${line}text-align:right;padding-left:12px;">${escapeHtml(value)}</td></tr>`;
}

function actionHtml({ action }: Letter): string {
  if (!action) return '';
  const url = escapeHtml(action.url);
  return `<p style="margin:24px 0 8px;"><a class="action" href="${url}" style="display:inline-block;background:${light.action};color:#FFFFFF;` +
    `padding:14px 22px;border-radius:14px;text-decoration:none;font-weight:600;">${escapeHtml(action.label)}</a></p>
<p class="soft" style="margin:0;color:${light.soft};font-size:14.5px;word-break:break-all;">${url}</p>`;
}

/** Escapes for element text and for attributes in double quotes. */
export function escapeHtml(text: string): string {
  return text.replace(/&/g, '&amp;').replace(/</g, '&lt;').replace(/>/g, '&gt;').replace(/"/g, '&quot;').replace(/'/g, '&#39;');
}
