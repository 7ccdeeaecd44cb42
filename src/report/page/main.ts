const page = JSON.parse(document.getElementById('data')!.textContent!) as PageData
const drawings: Chart[] = [
  ...Array.from(document.querySelectorAll<HTMLElement>('[data-picture]'), (host) =>
    makePicture(host, page.pictures[Number(host.dataset.picture)], page.colours)
  ),
  ...Array.from(document.querySelectorAll<HTMLElement>('[data-chart]'), (host) =>
    makeChart(host, page.charts[Number(host.dataset.chart)])
  )
]
const drawAll = () => {
  for (const drawing of drawings) drawing.draw()
}
matchMedia('(prefers-color-scheme: dark)').addEventListener('change', drawAll)
let lastWidth = document.documentElement.clientWidth
addEventListener('resize', () => {
  const width = document.documentElement.clientWidth
  if (width === lastWidth) return
  lastWidth = width
  drawAll()
})
