import { type ColourMap, inferno, redBlue, viridis } from '../output/draw/colours.js'
import { version } from '../output/version.js'
import { hashSource, pageAssets } from './assets.js'
import { escaped, jsonInScript, tableHtml } from './html.js'
import { style } from './style.js'
import type { PageData, ReportContent, TableSection } from './types.js'

/** The page of a report: one file that needs nothing from elsewhere, and allows nothing from elsewhere. */
export function reportPage(content: ReportContent): string {
  const { script, chartStyle } = pageAssets()
  const styles = `${chartStyle}${style}`
  const policy = [
    "default-src 'none'",
    `script-src ${hashSource(script)}`,
    `style-src ${hashSource(styles)}`,
    'img-src data:',
    "base-uri 'none'",
    "form-action 'none'"
  ].join('; ')
  const charts = content.charts.flatMap((section) => section.charts)
  const data: PageData = { pictures: content.pictures, charts, colours: colours() }
  const sections = sectionsOf(content)
  return `<!doctype html>
<html lang="en">
<head>
<meta charset="utf-8">
<meta http-equiv="Content-Security-Policy" content="${policy}">
<meta name="viewport" content="width=device-width, initial-scale=1">
<meta name="generator" content="motelight ${escaped(version)}">
<title>${escaped(content.title)}</title>
<style>${styles}</style>
</head>
<body>
<main>
<header>
<h1>${escaped(content.title)}</h1>
<p class="quiet">${escaped(content.summary)}</p>
<nav aria-label="Sections">${sections.map(({ heading }, i) => `<a href="#s${i}">${escaped(heading)}</a>`).join('')}</nav>
</header>
<noscript><p>Pictures and charts need the script of this page.</p></noscript>
${sections.map(({ heading, html }, i) => `<section id="s${i}" aria-labelledby="h${i}"><h2 id="h${i}">${escaped(heading)}</h2>\n${html}</section>`).join('\n')}
<footer>motelight ${escaped(version)}. This page holds all it shows; the files beside it hold all digits.</footer>
</main>
<script type="application/json" id="data">${jsonInScript(data)}</script>
<script>${script}</script>
</body>
</html>
`
}

function sectionsOf(content: ReportContent): { heading: string; html: string }[] {
  const { pictures, charts, tables, texts, warnings, reproduce } = content
  let chart = 0
  const all = [
    {
      heading: warnings.length === 1 ? '1 warning' : `${warnings.length} warnings`,
      html: warnings.length > 0 ? `<ul class="warnings">${warnings.map((text) => `<li>${escaped(text)}</li>`).join('')}</ul>` : ''
    },
    ...pictures.map(({ heading, notes }, i) => ({
      heading,
      html: `<div data-picture="${i}"></div>${notes.map((note) => `<p class="quiet">${escaped(note)}</p>`).join('')}`
    })),
    ...charts.map((section) => ({
      heading: section.heading,
      html: [
        ...section.charts.map(({ title }) => `<h3>${escaped(title)}</h3><div data-chart="${chart++}"></div>`),
        ...section.pictures.map(({ alt, base64 }) => `<img alt="${escaped(alt)}" src="data:image/png;base64,${base64}">`),
        ...section.tables.map((table) => tableOf(table, table.heading))
      ].join('')
    })),
    ...tables.map((table) => ({ heading: table.heading, html: tableOf(table, '') })),
    ...texts.map(({ heading, name, text }) => ({
      heading,
      html: `<details><summary>${escaped(name)}</summary><pre tabindex="0">${escaped(text)}</pre></details>`
    })),
    {
      heading: 'How to reproduce it',
      html: `<pre tabindex="0">${escaped(reproduce.commands.join('\n'))}</pre>${reproduce.remarks.map((text) => `<p>${escaped(text)}</p>`).join('')}${tableHtml(
        'Input files',
        ['file', 'SHA-256'],
        reproduce.inputs.map(({ file, sha256 }) => [file, sha256])
      )}`
    }
  ]
  return all.filter(({ html }) => html !== '')
}

function tableOf({ columns, rows, note }: TableSection, caption: string): string {
  if (rows.length === 0) return ''
  return tableHtml(caption, columns, rows) + (note ? `<p class="quiet">${escaped(note)}</p>` : '')
}

function colours(): PageData['colours'] {
  const grey = Uint8Array.from({ length: 768 }, (_, i) => Math.floor(i / 3))
  const reversed = grey.map((value) => 255 - value)
  const hex = (map: ColourMap) => Buffer.from(map).toString('hex')
  return {
    inferno: hex(inferno),
    viridis: hex(viridis),
    grey: hex(grey),
    'grey, reversed': hex(reversed),
    'blue–white–red': hex(redBlue)
  }
}
