/** The order in which nodes are eliminated and what each needs: flat lists, so that any currents run through quickly. */
export interface Elimination {
  node: number[]
  /** Sum of the conductances around the node when its turn came. */
  pivot: number[]
  /** Neighbours of step `i` stand from `first[i]` up to `first[i + 1]`. */
  first: number[]
  neighbour: number[]
  conductance: number[]
}

/** Nodes with more neighbours than this stay: eliminating them would fill the network. */
const maxNeighbours = 16

/**
 * A network of conductances from which nodes are eliminated one by one, those with the fewest neighbours first: the end
 * of a branch vanishes, a chain becomes one branch, a star becomes a mesh. Pivots are sums of conductances, so nothing
 * cancels. Held nodes stay and have no list of their own.
 *
 * Branches are kept as pairs of half-branches in linked lists, the two halves next to each other.
 */
export class ConductanceNetwork {
  readonly #held: Uint8Array
  readonly #gone: Uint8Array
  readonly #neighbours: Int32Array
  readonly #head: Int32Array
  readonly #next: number[] = []
  readonly #other: number[] = []
  readonly #value: number[] = []

  constructor(held: Uint8Array) {
    this.#held = held
    this.#gone = new Uint8Array(held.length)
    this.#neighbours = new Int32Array(held.length)
    this.#head = new Int32Array(held.length).fill(-1)
  }

  /** Adds a conductance between two nodes to what is already there. */
  connect(u: number, v: number, conductance: number): void {
    if (u === v || (this.#held[u] === 1 && this.#held[v] === 1)) return
    const from = this.#held[u] === 1 ? v : u
    const known = this.#find(from, from === u ? v : u)
    if (known >= 0) {
      this.#value[known]! += conductance
      this.#value[known ^ 1]! += conductance
      return
    }
    this.#link(u, v, conductance)
    this.#link(v, u, conductance)
  }

  /** Eliminates what it can; what stays is left for a dense solver. */
  eliminate(): Elimination {
    const steps: Elimination = { node: [], pivot: [], first: [0], neighbour: [], conductance: [] }
    const nodes = this.#held.length
    // Held nodes do not need a turn; the rest counts down to nothing in most networks before the limit rises far.
    let left = 0
    for (let node = 0; node < nodes; node++) if (this.#held[node] === 0) left++
    for (let limit = 2; limit <= maxNeighbours && left > 0; limit++) {
      const turn: number[] = []
      for (let node = 0; node < nodes; node++) if (this.#isDue(node, limit)) turn.push(node)
      while (turn.length > 0) {
        const node = turn.pop()!
        if (!this.#isDue(node, limit)) continue
        const start = steps.neighbour.length
        this.#remove(node, steps)
        left--
        for (let i = start; i < steps.neighbour.length; i++) {
          const neighbour = steps.neighbour[i]!
          if (this.#isDue(neighbour, limit)) turn.push(neighbour)
        }
      }
    }
    return steps
  }

  /** Connected groups of the nodes that stay. */
  blocks(): number[][] {
    const seen = new Uint8Array(this.#held.length)
    return this.#remaining().flatMap((first) => {
      if (seen[first] === 1) return []
      seen[first] = 1
      const members = [first]
      for (const node of members)
        this.forEachNeighbour(node, (neighbour) => {
          if (this.#held[neighbour] === 1 || seen[neighbour] === 1) return
          seen[neighbour] = 1
          members.push(neighbour)
        })
      return [members]
    })
  }

  forEachNeighbour(node: number, visit: (neighbour: number, conductance: number) => void): void {
    for (let half = this.#head[node]!; half >= 0; half = this.#next[half]!)
      if (this.#gone[this.#other[half]!] === 0) visit(this.#other[half]!, this.#value[half]!)
  }

  #isDue(node: number, limit: number): boolean {
    return this.#held[node] === 0 && this.#gone[node] === 0 && this.#neighbours[node]! <= limit
  }

  #remaining(): number[] {
    const left: number[] = []
    for (let node = 0; node < this.#held.length; node++)
      if (this.#held[node] === 0 && this.#gone[node] === 0) left.push(node)
    return left
  }

  #link(node: number, other: number, conductance: number): void {
    const half = this.#other.length
    this.#other.push(other)
    this.#value.push(conductance)
    this.#next.push(this.#head[node]!)
    // The half at a held node is never walked: it only keeps the pair together.
    if (this.#held[node] === 1) return
    this.#head[node] = half
    this.#neighbours[node]!++
  }

  /** The half-branch from one node to another, -1 where there is none; drops halves to nodes that are gone. */
  #find(node: number, other: number): number {
    let before = -1
    for (let half = this.#head[node]!; half >= 0; half = this.#next[half]!) {
      const end = this.#other[half]!
      if (end === other) return half
      if (this.#gone[end] === 0) before = half
      else if (before < 0) this.#head[node] = this.#next[half]!
      else this.#next[before] = this.#next[half]!
    }
    return -1
  }

  #remove(node: number, steps: Elimination): void {
    const start = steps.neighbour.length
    let pivot = 0
    for (let half = this.#head[node]!; half >= 0; half = this.#next[half]!) {
      const other = this.#other[half]!
      if (this.#gone[other] === 1) continue
      steps.neighbour.push(other)
      steps.conductance.push(this.#value[half]!)
      pivot += this.#value[half]!
      this.#neighbours[other]!--
    }
    this.#gone[node] = 1
    steps.node.push(node)
    steps.pivot.push(pivot)
    steps.first.push(steps.neighbour.length)
    for (let i = start; i < steps.neighbour.length; i++)
      for (let j = i + 1; j < steps.neighbour.length; j++)
        this.connect(steps.neighbour[i]!, steps.neighbour[j]!, (steps.conductance[i]! * steps.conductance[j]!) / pivot)
  }
}
