/** The test page's own plain look: paper and ink, one column, big targets, both schemes, no script. */
export const style = `
:root { color-scheme: light dark; --ground: #EDF0F1; --sheet: #FFFFFF; --ink: #16141D; --soft: #565B66; --rule: #8B929C;
  --action: #2B2A86; --on-action: #FFFFFF; --note: #FFEFC9; --on-note: #5A3A00; --bad: #FCE1E4; --on-bad: #8F1028; }
@media (prefers-color-scheme: dark) { :root { --ground: #0F0E14; --sheet: #1B1A22; --ink: #F1F2F4; --soft: #B4B9C2; --rule: #7C828D;
  --action: #B9B8FF; --on-action: #14132E; --note: #3A2C08; --on-note: #FFE3A3; --bad: #43141C; --on-bad: #FFC9D0; } }
* { box-sizing: border-box; }
body { margin: 0; background: var(--ground); color: var(--ink); font: 16px/1.5 system-ui, sans-serif; }
main { max-width: 480px; margin: 0 auto; padding: 18px; }
.banner { background: var(--note); color: var(--on-note); border-bottom: 2px dashed currentColor; padding: 12px 18px; text-align: center; font-weight: 700; }
h1 { font-size: 27px; line-height: 1.2; margin: 20px 0 8px; }
.sheet { background: var(--sheet); border-radius: 14px; padding: 18px; margin: 14px 0; }
.sheet > :first-child { margin-top: 0; } .sheet > :last-child { margin-bottom: 0; }
dl { margin: 0; display: grid; grid-template-columns: auto 1fr; gap: 4px 16px; }
dt { color: var(--soft); } dd { margin: 0; text-align: right; font-variant-numeric: tabular-nums; overflow-wrap: anywhere; }
label { display: block; font-weight: 600; margin: 14px 0 4px; }
.hint { color: var(--soft); font-size: 14.5px; margin: 0 0 4px; }
input { width: 100%; min-height: 48px; padding: 10px 12px; font: inherit; color: inherit; background: var(--ground); border: 1px solid var(--rule); border-radius: 8px; }
.pair { display: grid; grid-template-columns: 1fr 1fr; gap: 14px; align-items: end; }
button, .button { display: block; width: 100%; min-height: 52px; margin-top: 20px; padding: 12px; border: 2px solid var(--action); border-radius: 10px;
  background: var(--action); color: var(--on-action); font: inherit; font-weight: 700; text-align: center; text-decoration: none; cursor: pointer; }
.quiet { background: transparent; color: var(--action); margin-top: 12px; }
:focus-visible { outline: 3px solid var(--action); outline-offset: 3px; }
.alert { background: var(--bad); color: var(--on-bad); border-radius: 10px; padding: 12px 14px; margin: 14px 0; font-weight: 600; }
details { margin: 18px 0; } summary { min-height: 44px; padding: 10px 0; cursor: pointer; font-weight: 600; }
table { width: 100%; border-collapse: collapse; font-size: 14.5px; } th, td { text-align: left; padding: 6px 8px 6px 0; border-top: 1px solid var(--rule); vertical-align: top; }
td:first-child { font-family: ui-monospace, monospace; white-space: nowrap; }
`;
