/**
 * The look of a page: a calculation sheet. Paper, hairlines, numbered sections with their numbers in the margin, the
 * faces of the system, figures of equal width. Colours are pairs for light and dark; on paper it is black on white.
 */
export const pageStyle = `
:root{color-scheme:light dark;--paper:#fdfcf9;--desk:#ebe8e1;--ink:#1c2430;--soft:#56606e;--hair:#cfcac0;--rule:#5b6675;--wash:#f4f1ea;--accent:#1d5a8c;--accent-wash:#e3edf5;--alarm:#9a2a12;--alarm-wash:#f9e7e1;--mark:#7a5200;--mark-wash:#fbf0d2}
@media (prefers-color-scheme:dark){:root{--paper:#171b21;--desk:#0e1115;--ink:#e4e3de;--soft:#a3abb5;--hair:#353c46;--rule:#7d8895;--wash:#1f252d;--accent:#8fc1ec;--accent-wash:#1d3042;--alarm:#ffab94;--alarm-wash:#3a211b;--mark:#f0c566;--mark-wash:#352a10}}
*{box-sizing:border-box}
html{-webkit-text-size-adjust:100%;text-size-adjust:100%}
body{margin:0;background:var(--desk);color:var(--ink);font:15px/1.5 system-ui,-apple-system,'Segoe UI','Liberation Sans',Arial,sans-serif;font-variant-numeric:tabular-nums lining-nums;overflow-wrap:anywhere}
.skip{position:absolute;left:-99rem;background:var(--paper);color:var(--accent);padding:.5rem 1rem;z-index:9}
.skip:focus{left:.5rem;top:.5rem}
:focus-visible{outline:2px solid var(--accent);outline-offset:2px}
main:focus{outline:none}
.unseen{position:absolute;width:1px;height:1px;overflow:hidden;clip-path:inset(50%);white-space:nowrap}
.desk{max-width:76rem;margin:0 auto;padding:1.5rem;display:grid;grid-template-columns:minmax(0,1fr)}
.title-block,main,.panel{background:var(--paper);border:1px solid var(--rule)}
.title-block{display:grid;grid-template-columns:minmax(0,1fr)}
.title-block .name{padding:1rem 1.5rem 1.1rem}
.document{margin:0 0 .2rem;font-size:.75rem;letter-spacing:.09em;text-transform:uppercase;color:var(--soft)}
h1{margin:0;font-size:1.65rem;line-height:1.2;font-weight:650;letter-spacing:-.01em;max-height:9.6em;overflow:auto}
.job{margin:0;display:grid;grid-template-columns:repeat(12,minmax(0,1fr));border-top:1px solid var(--rule);overflow:hidden}
.job>div{border:solid var(--hair);border-width:0 1px 1px 0;margin:0 -1px -1px 0;padding:.3rem .6rem .4rem;min-height:2.9rem}
.job dt{font-size:.68rem;line-height:1.3;color:var(--soft)}
.job dd{margin:0;line-height:1.35}
.job .s2{grid-column:span 2}.job .s3{grid-column:span 3}.job .s4{grid-column:span 4}.job .s6{grid-column:span 6}.job .s8{grid-column:span 8}.job .s12{grid-column:span 12}
main{border-top:0;padding:.5rem 1.5rem 2rem 4.25rem;min-width:0}
section{padding:1.4rem 0 .4rem}
section+section{border-top:1px solid var(--hair)}
h2{position:relative;margin:0 0 .8rem;font-size:1.06rem;font-weight:650;line-height:1.3}
h2 .no{position:absolute;left:-2.75rem;width:2rem;text-align:right;color:var(--soft);font-weight:400}
h3{margin:1.3rem 0 .5rem;font-size:.95rem;font-weight:650}
p{margin:.4rem 0;max-width:46rem}
.note{color:var(--soft);font-size:.86rem}
a{color:var(--accent)}
.scroll{overflow-x:auto;max-width:100%;margin:.3rem 0 .8rem;scrollbar-width:thin}
table{border-collapse:collapse;border-top:1.5px solid var(--rule);border-bottom:1.5px solid var(--rule);font-size:.84rem;line-height:1.35;overflow-wrap:normal}
caption{text-align:left;font-size:.84rem;color:var(--soft);padding:0 0 .3rem}
th,td{padding:.22rem .7rem .22rem 0;text-align:left;vertical-align:baseline;font-weight:400}
th:first-child,td:first-child{padding-left:.3rem}
th:last-child,td:last-child{padding-right:.3rem}
thead th{font-weight:600;border-bottom:1px solid var(--rule);vertical-align:bottom}
tbody tr+tr>*{border-top:1px solid var(--hair)}
tfoot tr>*{border-top:1px solid var(--rule)}
.r{text-align:right;white-space:nowrap}
.u{color:var(--soft);white-space:nowrap}
tr>.group{font-weight:600;color:var(--ink);padding-top:.6rem}
dl{margin:.3rem 0}
main dl{display:grid;gap:0;border-top:1.5px solid var(--rule);border-bottom:1.5px solid var(--rule)}
main dl>div{display:grid;grid-template-columns:11rem minmax(0,1fr);gap:.2rem 1rem;padding:.28rem .3rem}
main dl>div+div{border-top:1px solid var(--hair)}
main dt{color:var(--soft)}
main dd{margin:0}
ul{margin:.3rem 0;padding:0;list-style:none;max-width:54rem}
li{padding:.22rem 0 .22rem 1.1rem;position:relative}
li::before{content:'–';position:absolute;left:0;color:var(--soft)}
.alarm{border-left:4px solid var(--alarm);background:var(--alarm-wash);padding:.6rem .9rem;margin:.6rem 0}
.alarm strong,.alarm-word{color:var(--alarm)}
.caution{border:1px solid var(--rule);padding:.6rem .9rem;font-size:.9rem;max-width:54rem}
figure{margin:.4rem 0 1rem}
figcaption{font-size:.84rem;color:var(--soft);margin-top:.3rem;max-width:46rem}
.picture{overflow-x:auto}
.picture svg{display:block;max-width:100%;height:auto}
.charts{display:grid;grid-template-columns:repeat(auto-fill,minmax(min(100%,21rem),1fr));gap:1rem 1.5rem}
.charts figure{margin:0}
@media screen and (max-width:50rem){body{font-size:16px}.desk{padding:0}.title-block,main,.panel{border-left:0;border-right:0}.title-block .name{padding:.9rem 1rem}.job .s2,.job .s3{grid-column:span 6}.job .s4,.job .s6,.job .s8,.job .s12{grid-column:span 12}main{padding:.25rem 1rem 2rem}h1{font-size:1.35rem}h2 .no{position:static;display:inline-block;width:auto;min-width:1.4rem;margin-right:.5rem;text-align:left}main dl>div{grid-template-columns:minmax(0,1fr);gap:0}}
@page{size:A4 portrait;margin:14mm 12mm 16mm 18mm}
@media print{:root{--paper:#fff;--desk:#fff;--ink:#000;--soft:#444;--hair:#bbb;--rule:#000;--wash:#fff;--accent:#000;--accent-wash:#fff;--alarm:#000;--alarm-wash:#fff;--mark:#000;--mark-wash:#fff;color-scheme:light}html{font-size:12px}body{font-size:9pt;line-height:1.38;background:#fff}.desk{display:block;max-width:none;padding:0}.skip,.screen-only{display:none}.title-block,main,.panel{border:0}.title-block{border:1pt solid #000}.title-block .name{padding:2mm 3mm}main{padding:0 0 0 7mm}section{padding:3.5mm 0 1mm}h1{font-size:15pt;max-height:none}h2{font-size:11pt;break-after:avoid}h2 .no{left:-7mm;width:5mm}h3{break-after:avoid}thead{display:table-header-group}tr,figure,li,dl>div{break-inside:avoid}table{font-size:7.8pt}th,td{padding:.5mm 2mm .5mm 0}.scroll,.picture{overflow:visible}.new-sheet{break-before:page;border-top:0!important}.alarm{border-left:3pt solid #000}.charts{grid-template-columns:1fr 1fr;gap:3mm 5mm}a{color:inherit;text-decoration:none}}
`;
