/** The style sheet of a page. Colours come from look.ts as custom properties, once per scheme. */
import { type Ink, allInks } from "../look.js";

function properties(pick: (ink: Ink) => string): string {
  return allInks()
    .map((ink) => `${ink.variable}:${pick(ink)}`)
    .join(";");
}

const RULES = `
*{box-sizing:border-box}
html{color-scheme:light dark;-webkit-text-size-adjust:100%;scroll-padding-top:1rem}
body{margin:0;background:var(--paper);color:var(--ink);font:1.0625rem/1.55 Charter,"Bitstream Charter","Iowan Old Style","Palatino Linotype",Palatino,P052,Georgia,serif;font-variant-numeric:lining-nums tabular-nums}
a{color:var(--link);text-underline-offset:.15em}
:focus-visible{outline:2px solid var(--link);outline-offset:2px}
nav,table,figure,.controls,.aside,dt,#following,#tip,.chart text{font-family:system-ui,"Segoe UI","Helvetica Neue",Arial,sans-serif}
.sheet{max-width:64rem;margin:0 auto;padding:2rem 1.25rem 6rem}
main>header,main>section>*,.item>*{max-width:42rem}
main .wide,main section{max-width:none}
h1{font-size:2rem;line-height:1.2;margin:0 0 .25rem;font-weight:600}
h2{font-size:1.5rem;line-height:1.25;margin:4rem 0 .75rem;font-weight:600}
h3{font-size:1.25rem;line-height:1.3;margin:3rem 0 .5rem;font-weight:600}
h4{font-size:1rem;line-height:1.35;margin:2rem 0 .25rem;font-weight:600}
h1,h2,h3,h4,p,li,dd{overflow-wrap:anywhere}
td,th{overflow-wrap:break-word}
p{margin:.6rem 0}
pre{margin:.4rem 0;padding:0 0 0 .9rem;border-left:2px solid var(--rule);font:.875rem/1.5 ui-monospace,"Cascadia Mono",Menlo,Consolas,"Liberation Mono",monospace;white-space:pre-wrap;overflow-wrap:anywhere}
code{font:.9em ui-monospace,"Cascadia Mono",Menlo,Consolas,"Liberation Mono",monospace;overflow-wrap:anywhere}
dl{margin:.8rem 0;display:grid;align-items:baseline;grid-template-columns:max-content 1fr;gap:.25rem 1.25rem}
dt{color:var(--soft);font-size:.875rem}
dd{margin:0}
.soft,.says,figcaption,.aside{color:var(--soft)}
.aside,figcaption,.says{font-size:.875rem;line-height:1.5}
.answers{padding:0;list-style:none}
.answers li{margin:.9rem 0}

.verdict{white-space:nowrap}
.outside{color:var(--outside);font-weight:600}
.scroll{overflow-x:auto;max-width:100%}
table{border-collapse:collapse;font-size:.875rem;line-height:1.4;margin:.8rem 0}
th,td{padding:.3rem .9rem .3rem 0;text-align:left;vertical-align:baseline;border-bottom:1px solid var(--grid)}
thead th{color:var(--soft);font-weight:500;vertical-align:bottom;border-bottom-color:var(--rule)}
th.num,td.num{text-align:right;white-space:nowrap}
tbody th{font-weight:500}
.verdicts th[scope=row]{min-width:10rem;max-width:16rem;position:sticky;left:0;background:var(--paper)}
.verdicts.many thead th.src{text-align:center;padding:.4rem .5rem .4rem 0}
.verdicts.many thead th.src span{display:inline-block;writing-mode:vertical-rl;transform:rotate(180deg);white-space:nowrap}
.verdicts.many td{font-size:.75rem;padding-right:.5rem}
.verdicts.many .shape{display:block}
.verdicts.many td{text-align:center}
figure{margin:2rem 0 2.5rem}
figure h4{margin:0 0 .2rem}
figure h4,figure .says,figcaption,figure .aside{max-width:46rem}
.says{margin:0 0 .6rem}
figcaption{margin:.5rem 0}
.chart{display:block;font-size:12px;height:auto;min-width:34rem;max-width:100%}
details{margin:.3rem 0;font-size:.875rem}
summary{cursor:pointer;color:var(--link);font-family:system-ui,"Segoe UI","Helvetica Neue",Arial,sans-serif}
details .scroll{max-height:28rem;overflow:auto}
nav{font-size:.875rem;line-height:1.4;margin:1.5rem 0}
nav ol{list-style:none;margin:0;padding:0}
nav li{margin:.35rem 0}
nav a{text-decoration:none;color:var(--soft)}
nav a:hover,nav a[aria-current]{color:var(--ink);text-decoration:underline}
nav ol ol{padding-left:.8rem}
nav ol ol li{margin:.2rem 0}
nav .part>ol{display:none}
.controls{display:flex;flex-wrap:wrap;gap:.5rem 1.5rem;align-items:baseline;font-size:.875rem;margin:2rem 0 1rem}
.controls[hidden]{display:none}
.controls input,.controls select{font:inherit;color:inherit;background:var(--paper);border:1px solid var(--soft);padding:.15rem .4rem;max-width:14rem}
.js a.source{text-decoration-style:dotted}
.js [data-tip],.js .chart [data-s]{cursor:pointer}
.js figure:not(#bias-map) .chart path[data-tip]:not([stroke]){stroke:transparent;stroke-width:12px;pointer-events:all}
.away,.printed{display:none}
.dim{opacity:.14}
tr.followed>*{background:var(--wash)}
#tip{position:fixed;z-index:3;pointer-events:none;background:var(--ink);color:var(--paper);font-size:.8125rem;line-height:1.4;padding:.35rem .55rem;max-width:22rem}
#following{position:fixed;z-index:2;left:0;right:0;bottom:0;margin:0;padding:.5rem 1.25rem;background:var(--wash);border-top:1px solid var(--rule);font-size:.875rem;max-width:none}
#following[hidden],#tip[hidden]{display:none}
#following button{font:inherit;color:var(--link);background:none;border:0;padding:0 .2rem;text-decoration:underline;cursor:pointer}
@media (min-width:80rem){
.sheet{max-width:84rem;display:grid;grid-template-columns:14.5rem minmax(0,1fr);gap:3.5rem;padding-left:2rem}
nav{position:sticky;top:1.5rem;align-self:start;max-height:calc(100vh - 3rem);overflow-y:auto;margin:.6rem 0 0}
nav .part>ol{display:block}
}
@media (max-width:40rem){
body{font-size:1rem}
h1{font-size:1.6rem}
h2{margin-top:3rem}
dl{grid-template-columns:1fr;gap:0}
dd{margin-bottom:.5rem}
.verdicts th[scope=row]{min-width:7rem;max-width:9rem}
}
@media (prefers-reduced-motion:no-preference){.chart [data-s]{transition:opacity .15s}}
@media print{
@page{size:A4;margin:10mm}
html{color-scheme:light;font-size:8pt}
body{font-size:1rem;line-height:1.35;background:#fff}
nav,.controls,details,.file,.problem .screen,#tip,#following{display:none!important}
.problem .printed{display:block}
.sheet{display:block;padding:0;max-width:none}
main>header,main>section>*,.item>*,figure h4,figure .says,figcaption,figure .aside{max-width:none}
.scroll{overflow:visible}
h2,h3{margin-top:0}
h4{margin-top:1rem}
main>section,.problem{break-before:page}
main>section:first-of-type,.problem:first-of-type{break-before:auto}
h2,h3,h4{break-after:avoid}
figure,tr,pre,.item{break-inside:avoid}
figure{margin:.6rem 0 0}
figcaption{margin:.2rem 0}
.says{margin:0 0 .2rem}
.chart{min-width:0;max-width:100%}
.problem figure{display:grid;grid-template-columns:minmax(0,1fr) 23rem;grid-template-rows:repeat(5,auto) 1fr;column-gap:1rem}
.problem figure h4{grid-column:1/-1}
.problem figure>.scroll{grid-column:1;grid-row:2/span 5}
.problem figure>p,.problem figcaption{grid-column:2;margin:0 0 .3rem;font-size:.8rem;line-height:1.25}
.problem .chart{width:auto;max-height:48mm;font-size:14px}
.problem figure[id^=budget] .chart{max-height:38mm}
table{margin:.3rem 0}
th,td{padding-top:.1rem;padding-bottom:.1rem}
dl{margin:.4rem 0;gap:.05rem 1rem}
p{margin:.25rem 0}
a{color:inherit;text-decoration:none}
}
`;

/** The whole sheet; the page's policy names it by its hash. */
export function styleSheet(): string {
  const light = properties((ink) => ink.light);
  const dark = properties((ink) => ink.dark);
  return `:root{${light}}\n@media screen and (prefers-color-scheme:dark){:root{${dark}}}${RULES}`;
}
