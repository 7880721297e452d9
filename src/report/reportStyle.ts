/** Colours as [name, light, dark]. Text and marks keep a contrast of 4.5 or more to `paper` and `panel`; `rule` and `grid` only decorate. */
export const COLORS: readonly (readonly [name: string, light: string, dark: string])[] = [
  ['paper', '#faf8f3', '#15191c'],
  ['panel', '#f0ece2', '#1e2429'],
  ['ink', '#1d2328', '#e8e4da'],
  ['muted', '#515a61', '#aab3b9'],
  ['link', '#0b4f82', '#86c3ef'],
  ['plus', '#0b5f99', '#6cb6ef'],
  ['minus', '#a03f08', '#f2a368'],
  ['mark', '#7a3b7d', '#d9a3dc'],
  ['rule', '#cdc6b6', '#3b444b'],
  ['grid', '#ddd7c9', '#2c343a'],
];

function colorRules(column: 1 | 2): string {
  return COLORS.map((color) => `--${color[0]}:${color[column]}`).join(';');
}

/** The report's whole style sheet: no font, picture or rule from elsewhere. */
export const REPORT_STYLE = `
:root{color-scheme:light dark;${colorRules(1)}}
@media (prefers-color-scheme:dark){:root{${colorRules(2)}}}
*{box-sizing:border-box}
body{margin:0;background:var(--paper);color:var(--ink);font:1rem/1.55 Charter,Georgia,serif}
main,header,footer{max-width:66rem;margin:0 auto;padding:0 1rem}
header{padding-top:2.2rem}
h1,h2,h3,h4,th,dt,svg text,nav,.family{font-family:system-ui,sans-serif}
h1{font-size:1.7rem;line-height:1.2;margin:0 0 .6rem;overflow-wrap:anywhere}
h2{font-size:1.2rem;margin:2.6rem 0 .8rem;padding-top:.7rem;border-top:3px double var(--rule)}
h3{font-size:1.05rem;margin:0 0 .6rem;overflow-wrap:anywhere}
h4{font-size:.9rem;margin:1rem 0 .2rem}
p,ul{margin:.3rem 0 .7rem;max-width:44rem}
ul{padding-left:1.2rem}
li,dd,figcaption{overflow-wrap:anywhere}
a{color:var(--link)}
a:focus-visible,.scroll:focus-visible{outline:3px solid var(--link);outline-offset:2px}
nav a{margin-right:1rem;white-space:nowrap}
.family{font-weight:normal;color:var(--muted)}
pre{background:var(--panel);padding:.8rem 1rem;overflow-x:auto;font:.85rem/1.5 ui-monospace,monospace;white-space:pre-wrap;overflow-wrap:anywhere}
.caution{border-left:4px solid var(--minus);padding-left:1rem}
.scroll{overflow-x:auto}
table{border-collapse:collapse;font-size:.85rem;font-variant-numeric:tabular-nums}
caption{text-align:left;color:var(--muted);padding-bottom:.5rem}
th,td{padding:.4rem .5rem;border-bottom:1px solid var(--rule);text-align:right;white-space:nowrap}
thead th{white-space:normal;vertical-align:bottom;font-size:.8rem;border-bottom-width:2px}
th[scope=row],th:first-child,td:nth-child(3),th:nth-child(3){text-align:left}
article{margin:0 0 1.6rem;padding:1rem 0 0;border-top:1px solid var(--rule)}
article:target{border-top-color:var(--mark);box-shadow:0 -3px 0 var(--mark)}
.beside{display:grid;grid-template-columns:minmax(0,27rem) minmax(0,1fr);gap:0 2rem}
dl{display:grid;grid-template-columns:repeat(auto-fill,minmax(9.5rem,1fr));gap:.5rem 1.2rem;margin:0}
dt{color:var(--muted);font-size:.78rem}
dd{margin:0;font-variant-numeric:tabular-nums}
figure{margin:0}
figcaption,.small{color:var(--muted);font-size:.85rem}
figure svg{display:block;width:100%;height:auto}
.scatter{max-width:44rem}
.legend{display:flex;flex-wrap:wrap;gap:.2rem 1.2rem;list-style:none;padding:0}
.legend svg{display:inline;width:1rem;height:1rem;vertical-align:-.15rem}
svg text{fill:var(--ink)}
.scatter svg text{font-size:12px}
.outline .zone-name,.halo{paint-order:stroke;stroke:var(--paper);stroke-width:4px;stroke-linejoin:round}
.ink-plus{stroke:var(--plus)}.ink-minus{stroke:var(--minus)}
pattern .ink-plus{fill:var(--plus)}pattern .ink-minus{fill:var(--minus)}
.zone{fill:none;stroke:var(--muted);stroke-opacity:.75}
.offset{fill:var(--mark);fill-opacity:.18;stroke:var(--mark);stroke-dasharray:4 3;vector-effect:non-scaling-stroke;stroke-width:1.4px}
.axis,.bar,.frame{fill:none;stroke:var(--ink)}
.leader{stroke:var(--ink)}.leader-end{fill:var(--ink)}
.grid{fill:none;stroke:var(--grid)}
.target{fill:none;stroke:var(--minus);stroke-width:1.5;stroke-dasharray:6 4}
.mark{stroke:var(--plus);stroke-width:1.6}.good{fill:var(--plus)}.miss{fill:var(--paper)}
a:focus-visible .mark,a:hover .mark{stroke:var(--mark);fill:var(--mark)}
footer{padding-top:1rem;padding-bottom:2.5rem;color:var(--muted);font-size:.88rem}
@media (max-width:46rem){.beside{grid-template-columns:minmax(0,1fr);row-gap:1rem}}
@media print{:root{${colorRules(1)};--paper:#ffffff}body{font-size:10pt}nav{display:none}a{color:inherit;text-decoration:none}
.scroll{overflow:visible}table{font-size:7.5pt}th,td{padding:.15rem .3rem;white-space:normal}thead th{font-size:7pt}th[scope=row]{white-space:nowrap}h2,h3,h4{break-after:avoid}article,figure,tr{break-inside:avoid}.beside{grid-template-columns:7cm 1fr}pre{border:1px solid var(--rule)}}
`;
