/*
 * Paper and ink for the page: the tokens of the screens, a column for A4 and Letter alike, and in print a foot on every page.
 * The foot stands in a table foot, which all engines repeat; page numbers only where the engine knows margin boxes.
 */
export const REPORT_CSS = `
*{box-sizing:border-box;margin:0;padding:0}
html{font:10.5pt/1.42 var(--font);color:var(--text);background:var(--paper);font-variant-numeric:tabular-nums;
  -webkit-print-color-adjust:exact;print-color-adjust:exact}
body{max-inline-size:190mm;margin:0 auto;padding:10mm 6mm}
.sheet{inline-size:100%;border-collapse:collapse;table-layout:fixed}
.sheet>tbody>tr>td,.sheet>tfoot>tr>td{padding:0;vertical-align:top}
h1{font-size:25pt;line-height:1.1;letter-spacing:-.02em;font-weight:650;margin-block:1mm 2mm}
h2{font-size:17pt;line-height:1.15;letter-spacing:-.012em;font-weight:650}
h2 small{font-size:.62em;font-weight:400;color:var(--text-quiet);letter-spacing:0}
h3{font-size:11.5pt;font-weight:650}
h4{font-size:8.6pt;font-weight:650;color:var(--text-quiet);margin-block-end:1mm}
h5{font-size:9.6pt;font-weight:650;margin-block:1.5mm .5mm}
p+p{margin-block-start:1.2mm}
ul{list-style:none}
code{font:8.4pt/1.3 var(--font-figures);overflow-wrap:anywhere}
.over,.quiet{color:var(--text-quiet)}
.over{font-size:9pt}
.practice{border:1.4pt dashed currentColor;padding:1mm 2.5mm;margin-block-start:2mm;font-weight:650;inline-size:fit-content}
.mark{inline-size:.95em;block-size:.95em;display:inline-block;vertical-align:-.12em;flex:none}
.coincident{color:var(--verdict-coincident)}.close{color:var(--verdict-close)}.apart{color:var(--verdict-apart)}
.undecided{color:var(--verdict-undecided)}.blind{color:var(--verdict-blind)}
b.coincident,b.close,b.apart,b.undecided,b.blind,span.coincident,span.close,span.apart,span.undecided,span.blind{white-space:nowrap}
.front>header{border-block-start:2.2pt solid var(--text);padding-block:2.5mm 4mm}
.front>header .line{display:flex;justify-content:space-between;gap:6mm;font-size:9pt;color:var(--text-quiet)}
.short{border-block-start:.6pt solid var(--text)}
.short li{display:grid;grid-template-columns:44mm 1fr 24mm;gap:4mm;padding-block:2mm;border-block-end:.5pt solid var(--edge);break-inside:avoid}
.short li>div:first-child{font-weight:650;overflow-wrap:anywhere}
.short li>div:first-child small{display:block;font-weight:400;color:var(--text-quiet);font-size:8.6pt}
.short .trust{text-align:end;color:var(--text-quiet);font-size:9pt}
.front h3{margin-block:5mm 1.5mm}
.front .specialist h3{margin-block:0 1mm}
.howto{font-size:9pt;break-inside:avoid;margin-block-start:5mm}
.howto h3{margin-block-end:1.5mm}
.howto>div{columns:2;column-gap:8mm}
.howto p{break-inside:avoid}
.reading{break-before:page;border-block-start:2.2pt solid var(--text);padding-block:2.5mm 8mm;margin-block-start:10mm}
.sentence{font-size:14.5pt;line-height:1.25;letter-spacing:-.008em;font-weight:600;margin-block-start:3.5mm;text-wrap:balance}
.driven{font-size:11pt;margin-block-start:1.2mm}
.driven .trust{font-weight:650;white-space:nowrap}
.specialist{border:1.4pt solid var(--verdict-coincident);border-inline-start-width:5pt;padding:2mm 3mm;margin-block-start:3.5mm;break-inside:avoid}
.specialist h3{color:var(--verdict-coincident)}
.two{display:grid;grid-template-columns:92mm 1fr;gap:7mm;margin-block-start:4mm}
.two .part:first-child{margin-block-start:0}
figure{break-inside:avoid}
figcaption{font-size:8.2pt;line-height:1.3;color:var(--text-quiet);margin-block-start:.8mm}
.chart svg{display:block;inline-size:100%;background:var(--surface)}
.ladder svg{border:.5pt solid var(--edge)}
.plot{margin-block-start:4mm}
.part{margin-block-start:4mm}
.found li{display:flex;flex-wrap:wrap;gap:0 3mm;padding-block:1mm;border-block-end:.5pt solid var(--edge)}
.found b{font-size:12.5pt;inline-size:100%}
.doubts li{font-size:9pt;padding-block:.8mm}
.doubts i{font-style:normal;color:var(--text-quiet)}
.ways li{display:grid;grid-template-columns:30mm 24mm 1fr;gap:3mm;padding-block:.9mm;border-block-end:.5pt solid var(--edge);font-size:9.4pt;break-inside:avoid}
.hard{color:var(--text-quiet)}
.levels{font-size:9.4pt;margin-block-start:1.5mm}
.levels li{padding-block:.8mm;border-block-end:.5pt solid var(--edge);break-inside:avoid}
.part>.quiet{font-size:9pt}
.typed{white-space:pre-wrap;overflow-wrap:anywhere}
.photos{display:flex;flex-wrap:wrap;gap:3mm;margin-block-start:4mm}
.photos img{max-inline-size:min(86mm,100%);max-block-size:58mm;break-inside:avoid;border:.5pt solid var(--edge)}
.beside .photos{margin-block-start:0}
.photos+.part,.two .photos+.part:first-child{margin-block-start:3mm}
.detail{margin-block-start:6mm;border-block-start:.6pt solid var(--text);padding-block-start:2mm}
.detail>h3{break-after:avoid}
h4,h5{break-after:avoid}
.numbers{inline-size:100%;border-collapse:collapse;font-size:8.6pt;line-height:1.3}
.numbers th,.numbers td{text-align:start;vertical-align:top;padding:.8mm 2mm .8mm 0;border-block-end:.5pt solid var(--edge);font-weight:400;overflow-wrap:break-word}
.numbers thead th{color:var(--text-quiet);border-block-end-color:var(--text)}
.numbers tr{break-inside:avoid}
.facts>div{display:grid;grid-template-columns:minmax(28mm,36%) 1fr;gap:3mm;padding-block:.5mm;font-size:8.8pt;break-inside:avoid}
.facts dt{color:var(--text-quiet)}
.facts dd{overflow-wrap:anywhere}
.columns,.plots{display:grid;grid-template-columns:1fr 1fr;gap:0 8mm}
.tight{white-space:nowrap}
.foot{border-block-start:.6pt solid var(--text);margin-block-start:4mm;padding-block-start:1.4mm;font-size:7.8pt;line-height:1.3;color:var(--text-quiet)}
.foot b{color:var(--text)}
@page{margin:13mm 14mm 12mm;@bottom-right{content:counter(page) " / " counter(pages);font:7.8pt system-ui,sans-serif}}
@media print{
  html{background:none}
  body{max-inline-size:none;padding:0}
  .reading{margin-block-start:0}
  .chart svg{background:none}
}
@media screen and (max-width:640px){
  .two,.short li,.ways li,.columns,.plots{grid-template-columns:1fr;gap:1mm}
  .howto>div{columns:1}
  .short .trust{text-align:start}
  .numbers{display:block;overflow-x:auto}
  .numbers th,.numbers td{overflow-wrap:normal}
}
`;

/** Tokens that the style sheet uses. */
export const REPORT_TOKENS: readonly string[] = [
  ...new Set([...REPORT_CSS.matchAll(/var\((--[a-z-]+)\)/g)].map(([, name]) => name!)),
];
