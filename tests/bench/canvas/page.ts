import '../../../src/assets/tokens.css'
import '../../../src/assets/base.css'
import '@vue-flow/core/dist/style.css'
import '@vue-flow/core/dist/theme-default.css'
import { VueFlow } from '@vue-flow/core'
import { createPinia } from 'pinia'
import { createApp, h, nextTick } from 'vue'
import type { BuildDocument } from '#shared/build/document.ts'
import { resolve } from '#shared/build/resolve.ts'
import { indexCatalog, type Catalog } from '#shared/catalog/catalog.ts'
import { check } from '#shared/check/check.ts'
import { arrange } from '#shared/layout/arrange.ts'
import DiagramCanvas from '../../../src/components/diagram/DiagramCanvas.vue'
import { useCanvasStore } from '../../../src/stores/canvas.ts'
import { useChecksStore } from '../../../src/stores/checks.ts'
import { useDiagramStore } from '../../../src/stores/diagram.ts'
import type { CanvasBench } from './bench.ts'
import { settle, timeFrames } from './frames.ts'

const shell = 'position: absolute; inset: 0'
const pinia = createPinia()

async function mount(what: 'own' | 'bare', document: BuildDocument, catalog: Catalog) {
  const index = indexCatalog(catalog)
  const drawing = arrange(resolve(document, index))
  if (what === 'own') {
    const app = createApp({ render: () => h('div', { style: shell }, [h(DiagramCanvas)]) }).use(pinia)
    useDiagramStore(pinia).open('bench', document, index, true)
    useChecksStore(pinia).result = check(document, index)
    app.mount('#app')
  } else {
    const nodes = drawing.nodes.map((node) => ({ id: node.id, label: node.part, position: { x: node.x, y: node.y } }))
    const edges = drawing.runs.map((run) => ({ id: run.id, source: run.from.node, target: run.to.node }))
    const flow = () => h(VueFlow, { nodes, edges, fitViewOnInit: true, minZoom: 0.08 })
    createApp({ render: () => h('div', { style: shell }, [flow()]) }).mount('#app')
  }
  await nextTick()
  await settle(20)
  // Both show the whole sheet, so that as much is painted.
  useCanvasStore(pinia).acts?.fit()
  await settle(20)
  return { nodes: drawing.nodes.length, runs: drawing.runs.length }
}

const time: CanvasBench['time'] = (what, frames) => {
  const selector = what === 'drag' ? '.vue-flow__node-part, .vue-flow__node-default' : '.vue-flow__pane'
  const all = [...globalThis.document.querySelectorAll<HTMLElement>(selector)]
  const target = all[all.length >> 1]
  if (!target) throw new Error(`nothing to ${what}`)
  return timeFrames(target, frames)
}

async function timeEdit(times: number): Promise<number[]> {
  const diagram = useDiagramStore(pinia)
  const took: number[] = []
  for (let i = 0; i < times; i++) {
    const drive = diagram.document?.parts.find((part) => part.serial !== undefined)
    if (!drive) throw new Error('no drive with a serial')
    const start = performance.now()
    const patch = { serial: `BENCH${i}` }
    diagram.commit({
      ok: true,
      edit: { label: 'bench', changes: [{ op: 'updatePart', id: drive.id, patch }] },
      notes: [],
    })
    await nextTick()
    globalThis.document.body.getBoundingClientRect()
    took.push(performance.now() - start)
    await settle(2)
  }
  return took
}

const bench: CanvasBench = { mount, time, timeEdit }
Object.assign(globalThis, { benchOf: () => bench })
