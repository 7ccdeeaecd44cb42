/** The style of the page: light and dark from one set of colours; text has a contrast of at least 4.5 to its ground (WCAG 2.2 AA, 1.4.3). */
export const style = `
:root { color-scheme: light dark;
  --ground: #fbfaf7; --panel: #ffffff; --ink: #1d2126; --quiet: #5a626c; --line: #d9d6ce; --edge: #84807a; --accent: #8a4b08; --alert: #fdf1dc;
  --s0: #1d2126; --s1: #a86400; --s2: #b3372b; --s3: #0b68a8; --s4: #6b4fa0; --s5: #2d7a46; }
@media (prefers-color-scheme: dark) { :root {
  --ground: #14171a; --panel: #1b1f24; --ink: #e8e6e1; --quiet: #a3abb5; --line: #343a42; --edge: #7d858f; --accent: #f0b261; --alert: #33291a;
  --s0: #e8e6e1; --s1: #e9a23b; --s2: #f0796b; --s3: #62b4ea; --s4: #b79be8; --s5: #74c48d; } }
* { box-sizing: border-box; }
body { margin: 0; background: var(--ground); color: var(--ink); font: 16px/1.55 "Iowan Old Style", "Palatino Linotype", Palatino, Georgia, "DejaVu Serif", serif; }
main { max-width: 64rem; margin: 0 auto; padding: 2.5rem 1.25rem 4rem; }
h1 { font-size: 2rem; line-height: 1.2; font-weight: 600; margin: 0 0 .4rem; overflow-wrap: anywhere; }
h2 { font-size: 1.3rem; font-weight: 600; margin: 3rem 0 1rem; padding-top: .8rem; border-top: 1px solid var(--line); overflow-wrap: anywhere; }
h3 { font-size: 1rem; font-weight: 600; margin: 1.6rem 0 .5rem; }
p { margin: .4rem 0; } .quiet { color: var(--quiet); }
nav { margin: 1.2rem 0 0; font-size: .9rem; } nav a { margin-right: 1.2rem; display: inline-block; padding: .15rem 0; }
a { color: var(--accent); }
.warnings { list-style: none; margin: 1.5rem 0 0; padding: 0; }
.warnings li { background: var(--alert); border-left: 3px solid var(--accent); padding: .5rem .9rem; margin: .4rem 0; overflow-wrap: anywhere; }
.controls { display: flex; flex-wrap: wrap; gap: .6rem 1.1rem; align-items: end; margin: .4rem 0 .8rem; }
.controls, .readout, .legend, table, button, select, input { font-family: system-ui, "Segoe UI", Roboto, "DejaVu Sans", sans-serif; font-size: .85rem; }
.controls label { display: grid; gap: .15rem; color: var(--quiet); } .controls .tick { display: flex; gap: .35rem; align-items: center; padding-bottom: .35rem; }
.controls output { color: var(--ink); font-variant-numeric: tabular-nums; }
select, button { color: var(--ink); background: var(--panel); border: 1px solid var(--edge); border-radius: 4px; padding: .3rem .55rem; min-height: 2rem; }
button { cursor: pointer; } button:hover { border-color: var(--accent); }
input[type=range] { width: 9rem; accent-color: var(--accent); margin: .45rem 0; } input[type=checkbox] { accent-color: var(--accent); width: 1rem; height: 1rem; margin: 0; }
:focus-visible { outline: 2px solid var(--accent); outline-offset: 2px; }
figure { margin: 0; } .sky { max-width: 44rem; }
canvas.sky { display: block; width: 100%; cursor: crosshair; touch-action: none; }
.readout { display: block; min-height: 3em; margin: .5rem 0; font-variant-numeric: tabular-nums; color: var(--ink); white-space: pre-line; }
.legend { display: flex; flex-wrap: wrap; gap: .2rem 1.1rem; list-style: none; margin: .3rem 0; padding: 0; font-variant-numeric: tabular-nums; }
.legend i { display: inline-block; width: 1.1em; border-top: 3px solid; margin-right: .4em; vertical-align: middle; }
.chart { min-width: 0; }
.scroll { overflow-x: auto; }
table { border-collapse: collapse; font-variant-numeric: tabular-nums; } caption { text-align: left; font-weight: 600; padding: .6rem 0 .3rem; }
th, td { text-align: right; padding: .3rem 1.2rem .3rem 0; border-bottom: 1px solid var(--line); white-space: nowrap; } th { color: var(--quiet); font-weight: 600; }
th:first-child, td:first-child { text-align: left; }
img { max-width: 100%; height: auto; background: #fff; border-radius: 4px; display: block; }
pre { font: .82rem/1.5 ui-monospace, "DejaVu Sans Mono", Menlo, Consolas, monospace; background: var(--panel); border: 1px solid var(--line); border-radius: 4px; padding: .8rem 1rem; overflow-x: auto; margin: .6rem 0; }
summary { cursor: pointer; color: var(--accent); padding: .3rem 0; } footer { margin-top: 3rem; color: var(--quiet); font-size: .85rem; }
.u-select { background: color-mix(in srgb, var(--accent) 22%, transparent); }
@media (max-width: 40rem) { main { padding: 1.4rem 1rem 3rem; } h1 { font-size: 1.5rem; } }
@media print { .controls { display: none; } }
`
