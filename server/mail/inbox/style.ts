/** The inbox page's style sheet: the app's tokens in both schemes, one column on a phone, two panes when wide. */
export const styleSheet = `
:root { color-scheme: light dark; --ground:#EDF0F1; --sheet:#FFFFFF; --ink:#16141D; --soft:#565B66; --rule:#CFD5DA; --action:#2B2A86; --onAction:#FFFFFF; --tint:#E4E5FA; }
@media (prefers-color-scheme: dark) { :root { --ground:#0B0A10; --sheet:#16141D; --ink:#EDF0F1; --soft:#B4BAC4; --rule:#3A3F49; --action:#BDBBF7; --onAction:#0B0A10; --tint:#26254A; } }
@font-face { font-family:'Atkinson Hyperlegible Next'; src:url('/fonts/text.ttf'); font-weight:400; }
@font-face { font-family:'Atkinson Hyperlegible Next'; src:url('/fonts/text-strong.ttf'); font-weight:700; }
@font-face { font-family:'Bricolage Grotesque'; src:url('/fonts/heading.ttf'); font-weight:600; }
* { box-sizing:border-box; }
body { margin:0; background:var(--ground); color:var(--ink); font:16px/1.5 'Atkinson Hyperlegible Next', Helvetica, Arial, sans-serif; }
header { padding:14px 18px 0; }
.name { margin:0 0 8px; font:600 18px/1.3 'Bricolage Grotesque', sans-serif; }
.series { height:4px; border-radius:2px; background:linear-gradient(90deg,#0B0A10,#8f959c 8%,#f4f1e4 16%,#f2c14a 24%,#d7522c 31%,#8c2257 36%,#3a2f9e 41%,#2386c9 48%,#4fb36a 56%,#e6d34e 64%,#e0699a 72%,#7fc6a8 84%,#efc3cf); }
main, nav { padding:18px; max-width:720px; }
h1 { font:600 27px/1.2 'Bricolage Grotesque', sans-serif; margin:0 0 14px; overflow-wrap:anywhere; }
.quiet { color:var(--soft); font-size:14.5px; font-family:'Atkinson Hyperlegible Next', sans-serif; font-weight:400; }
a { color:var(--action); }
a:focus-visible, summary:focus-visible, iframe:focus-visible { outline:3px solid var(--action); outline-offset:2px; }
.skip { position:absolute; left:-999px; } .skip:focus { left:8px; top:8px; background:var(--sheet); padding:10px; }
.list { list-style:none; margin:0 0 18px; padding:0; }
.list a { display:block; min-height:44px; padding:12px 14px; margin:0 0 8px; background:var(--sheet); border:1px solid var(--rule); border-radius:14px; color:var(--ink); text-decoration:none; overflow-wrap:anywhere; }
.list a[aria-current] { background:var(--tint); border-color:var(--action); }
.list .quiet { display:block; }
.button { display:inline-block; min-height:52px; padding:13px 24px; border-radius:14px; background:var(--action); color:var(--onAction); text-decoration:none; font-weight:700; }
dl { display:grid; grid-template-columns:max-content 1fr; gap:4px 14px; margin:0 0 14px; } dt { color:var(--soft); } dd { margin:0; overflow-wrap:anywhere; }
iframe { width:100%; height:max(70vh, 700px); border:1px solid var(--rule); border-radius:14px; background:var(--ground); }
details { margin-top:14px; } summary { min-height:44px; padding:10px 0; cursor:pointer; }
pre { white-space:pre-wrap; overflow-wrap:anywhere; background:var(--sheet); border:1px solid var(--rule); border-radius:14px; padding:14px; font:14.5px/1.5 'Spline Sans Mono', ui-monospace, monospace; }
@media (min-width:1000px) { .panes { display:grid; grid-template-columns:380px 1fr; } .panes nav { max-height:calc(100vh - 60px); overflow:auto; } }
@media (max-width:999px) { .panes nav .list { display:none; } .panes nav { padding-bottom:0; } }
`;
