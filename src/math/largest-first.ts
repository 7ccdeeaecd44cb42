/** Numbered things, the one of largest value first: a binary heap in flat arrays that grow. */
export class LargestFirst {
  private items = new Int32Array(1024)
  private values = new Float64Array(1024)
  length = 0

  push(item: number, value: number): void {
    if (this.length === this.items.length) {
      const items = new Int32Array(2 * this.length)
      const values = new Float64Array(2 * this.length)
      items.set(this.items)
      values.set(this.values)
      this.items = items
      this.values = values
    }
    this.rise(this.length++, item, value)
  }

  /** Takes the first thing; undefined when there is none. Things of equal value come in an order that is always the same. */
  pop(): number | undefined {
    if (this.length === 0) return undefined
    const { items, values } = this
    const first = items[0]
    const last = --this.length
    const [item, value] = [items[last], values[last]]
    let i = 0
    for (;;) {
      let child = 2 * i + 1
      if (child >= last) break
      if (child + 1 < last && values[child + 1] > values[child]) child++
      if (values[child] <= value) break
      items[i] = items[child]
      values[i] = values[child]
      i = child
    }
    items[i] = item
    values[i] = value
    return first
  }

  private rise(from: number, item: number, value: number): void {
    const { items, values } = this
    let i = from
    while (i > 0) {
      const parent = (i - 1) >> 1
      if (values[parent] >= value) break
      items[i] = items[parent]
      values[i] = values[parent]
      i = parent
    }
    items[i] = item
    values[i] = value
  }
}
