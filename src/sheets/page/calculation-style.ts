/** The look of what only a calculation sheet has: the panel of handles, the flow diagram, wide tables. */
export const calculationStyle = `
mark{background:var(--mark-wash);color:var(--mark);padding:0 .3em;border:1px solid currentColor;border-radius:2px}
.desk.with-panel{max-width:94rem}
.panel{border-top:0;padding:.9rem 1.25rem 1.1rem}
.panel h2{margin:0 0 .3rem}
.panel .note{margin:0 0 .8rem;font-size:.8rem;line-height:1.4}
.handle{padding:.55rem 0 .5rem;border-top:1px solid var(--hair)}
.handle-head{font-size:.84rem;font-weight:600;line-height:1.3;overflow-wrap:anywhere}
.handle-row{display:grid;grid-template-columns:minmax(0,1fr) 5.4rem auto;gap:.5rem;align-items:center;margin-top:.15rem}
.handle-row .u{font-size:.84rem;min-width:2rem}
input,button{font:inherit;color:inherit}
input[type=range]{width:100%;margin:0;height:1.75rem;accent-color:var(--accent)}
input[type=text]{width:100%;text-align:right;background:var(--paper);border:1px solid var(--rule);border-radius:2px;padding:.15rem .4rem;min-height:1.75rem;font-variant-numeric:tabular-nums}
input[aria-invalid=true]{border:2px solid var(--alarm)}
button{background:var(--paper);border:1px solid var(--rule);border-radius:2px;padding:.25rem .7rem;min-height:1.9rem;font-size:.84rem;cursor:pointer}
button:hover{background:var(--wash)}
button:disabled{color:var(--soft);border-color:var(--hair);cursor:default}
.moved{margin:.25rem 0 0;font-size:.8rem;display:flex;flex-wrap:wrap;gap:.2rem .5rem;align-items:baseline}
.moved[hidden]{display:none}
.moved button{min-height:1.5rem;padding:0 .5rem;font-size:.8rem;margin-left:auto}
.fault:not(:empty){margin:.35rem 0 0;border-left:3px solid var(--alarm);background:var(--alarm-wash);padding:.35rem .6rem;font-size:.82rem;line-height:1.4}
.fault p{margin:.1rem 0}
.fault .what{font-weight:600;color:var(--alarm)}
.glance dl{margin:.2rem 0 0;border-top:1.5px solid var(--rule);border-bottom:1.5px solid var(--rule)}
.glance dl>div{display:flex;justify-content:space-between;gap:.8rem;padding:.2rem .1rem;font-size:.86rem}
.glance dl>div+div{border-top:1px solid var(--hair)}
.glance dt{color:var(--soft)}
.glance dd{margin:0;white-space:nowrap;text-align:right}
.actions{display:flex;flex-wrap:wrap;gap:.4rem;margin-top:.8rem}
.said{min-height:1.4em;margin:.5rem 0 0;font-size:.8rem;color:var(--soft)}
.streams th:first-child,.long th:first-child,.blocks th:first-child{position:sticky;left:0;background:var(--paper)}
.streams .inner{padding-left:1.1rem}
.streams thead th{white-space:nowrap}
.streams td.word{white-space:normal;max-width:8rem;overflow-wrap:break-word}
.prose{min-width:16rem;max-width:38rem}
.blocks .prose{font-size:.8rem;color:var(--soft)}
.r.prose{white-space:normal}
.diagram .picture{overflow:visible}
.diagram .picture svg{min-width:100%;max-width:none;height:auto}
.diagram [fill="#fff"]{fill:var(--paper)}
.diagram [fill="#000"]{fill:var(--ink)}
.diagram [stroke="#000"]{stroke:var(--ink)}
.void{position:relative}
.void>*{text-decoration:line-through;opacity:.4}
.void::before{content:'No values: the loop does not close at these settings. What is struck out belongs to the last ones at which it did.';display:block;border-left:4px solid var(--alarm);background:var(--alarm-wash);padding:.4rem .8rem;margin-bottom:.6rem}
.waiting .charts{opacity:.55}
@media screen and (min-width:70rem){.desk.with-panel:has(.panel:not([hidden])){grid-template-columns:21rem minmax(0,1fr)}.desk.with-panel .title-block{grid-column:1/-1}.desk.with-panel .panel{position:sticky;top:0;align-self:start;max-height:100vh;overflow:auto;border-right:0;scrollbar-width:thin}}
@media screen and (max-width:50rem){.long .prose{min-width:9rem}.streams td.word{min-width:4rem}}
@media print{.panel{display:none}mark{border:.5pt solid #000}.diagram{page:wide;break-before:page;break-after:page}.diagram .picture svg{min-width:0;width:100%;max-width:100%;max-height:165mm}.streams th:first-child,.long th:first-child,.blocks th:first-child{position:static}.prose{min-width:0}.void>*{display:none}}
@page wide{size:A4 landscape;margin:14mm 12mm 14mm 18mm}
`;
