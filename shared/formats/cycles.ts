/**
 * Finds every group of nodes that reach each other, or themselves, along edges; linear, and without recursion.
 * @returns One list a cycle, each node in at most one.
 * @see https://doi.org/10.1137/0201010 Tarjan 1972
 */
export function cyclesOf<Node>(
  nodes: Iterable<Node>,
  edgesOf: (node: Node) => readonly Node[],
): Node[][] {
  const order = new Map<Node, number>()
  const low = new Map<Node, number>()
  const open: Node[] = []
  const isOpen = new Set<Node>()
  const cycles: Node[][] = []
  const enter = (node: Node) => {
    order.set(node, order.size)
    low.set(node, order.get(node)!)
    open.push(node)
    isOpen.add(node)
    return { node, edges: edgesOf(node), next: 0 }
  }
  const lower = (node: Node, to: number) => low.set(node, Math.min(low.get(node)!, to))
  const close = (node: Node, edges: readonly Node[]) => {
    const members = open.splice(open.lastIndexOf(node))
    for (const member of members) isOpen.delete(member)
    if (members.length > 1 || edges.includes(node)) cycles.push(members)
  }
  for (const start of nodes) {
    if (order.has(start)) continue
    const path = [enter(start)]
    while (path.length > 0) {
      const step = path.at(-1)!
      const target = step.edges[step.next++]
      if (target === undefined) {
        path.pop()
        if (low.get(step.node) === order.get(step.node)) close(step.node, step.edges)
        const above = path.at(-1)
        if (above) lower(above.node, low.get(step.node)!)
      } else if (!order.has(target)) {
        path.push(enter(target))
      } else if (isOpen.has(target)) {
        lower(step.node, order.get(target)!)
      }
    }
  }
  return cycles
}
