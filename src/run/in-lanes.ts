/**
 * Does something with every item, begun in their order, at most `lanes` of them at a time. When one fails no other is begun, those
 * under way come to their end, and it rejects with the first failure.
 */
export async function inLanes<Item>(
  items: Item[],
  lanes: number,
  work: (item: Item, index: number) => Promise<void>
): Promise<void> {
  const queue = items.entries()
  const failures: unknown[] = []
  const lane = async () => {
    for (const [index, item] of queue) {
      await work(item, index).catch((error) => failures.push(error))
      if (failures.length > 0) return
    }
  }
  await Promise.all(Array.from({ length: lanes }, lane))
  if (failures.length > 0) throw failures[0]
}
