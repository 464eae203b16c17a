/** The report's own colours, for light, dark and paper; the plots take theirs from the same custom properties. */
export const reportStyle = `
:root{--text:#24292f;--quiet:#57606a;--line:#d0d4d9;--background:#ffffff;
--plot-text:#24292f;--plot-background:#ffffff;--plot-frame:#6b7280;--plot-grid:#e3e6ea;--plot-mark:#24292f;--plot-limit:#5c4a00;--plot-missed:#b3261e;
--plot-series-1:#1f5fa8;--plot-series-2:#a2480a;--plot-series-3:#2f6f3e;--plot-series-4:#6a3d9a}
@media screen and (prefers-color-scheme:dark){:root{--text:#d6d9dd;--quiet:#a3a9b1;--line:#3d434b;--background:#1c1f23;
--plot-text:#d6d9dd;--plot-background:#1c1f23;--plot-frame:#8b929b;--plot-grid:#343a41;--plot-mark:#e6e8ea;--plot-limit:#d9c27a;--plot-missed:#ff8a80;
--plot-series-1:#7ab4f5;--plot-series-2:#f0a060;--plot-series-3:#86c995;--plot-series-4:#c3a1ec}}
body{max-width:960px;margin:0 auto;padding:8px 20px 32px;color:var(--text);background:var(--background);font:14px/1.5 system-ui,sans-serif}
h1{margin:18px 0 0;font-size:1.5em;overflow-wrap:anywhere}
h2{margin:26px 0 6px;font-size:1.1em}
p{margin:4px 0}
.quiet,figcaption,thead th{color:var(--quiet)}
.verdict{margin:10px 0;padding-left:10px;border-left:4px solid var(--quiet);overflow-wrap:anywhere}
.verdict.errors{border-left-color:var(--plot-missed)}
.verdict.warnings{border-left-color:var(--plot-series-2)}
.scroll{overflow-x:auto}
table{border-collapse:collapse;font-variant-numeric:tabular-nums}
th,td{padding:3px 14px 3px 0;border-bottom:1px solid var(--line);text-align:left;vertical-align:top;font-weight:400;overflow-wrap:break-word}
figure{margin:0}
figure svg{display:block;max-width:100%;height:auto}
code{font-family:ui-monospace,monospace;font-size:.95em}
footer{margin-top:26px}
@media print{body{max-width:none;padding:0;font-size:10.5pt}section{break-inside:avoid}.scroll{overflow:visible}}
`;
