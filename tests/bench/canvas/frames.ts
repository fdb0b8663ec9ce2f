import type { FrameTimes } from './bench.ts'

const frame = (): Promise<number> => new Promise((done) => requestAnimationFrame(done))

export async function settle(frames: number): Promise<void> {
  for (let i = 0; i < frames; i++) await frame()
}

/** Presses on an element, moves the pointer a little each frame in a circle, and lets go. */
export async function timeFrames(target: HTMLElement, frames: number): Promise<FrameTimes> {
  const box = target.getBoundingClientRect()
  const isPane = box.width > 600
  const start = isPane ? { x: innerWidth - 40, y: innerHeight - 40 } : { x: box.x + box.width / 2, y: box.y + 6 }
  const fire = (on: EventTarget, type: string, x: number, y: number) =>
    on.dispatchEvent(
      new MouseEvent(type, {
        bubbles: true,
        cancelable: true,
        view: window,
        clientX: x,
        clientY: y,
        button: 0,
        buttons: 1,
      }),
    )
  fire(target, 'mousedown', start.x, start.y)
  const frameTimes: number[] = []
  const workTimes: number[] = []
  let before = await frame()
  for (let i = 0; i < frames; i++) {
    const angle = (i / 30) * Math.PI
    const began = performance.now()
    fire(window, 'mousemove', start.x + 60 * Math.sin(angle), start.y + 40 * (Math.cos(angle) - 1))
    // Vue renders in a microtask; asking for a box then has style and layout done too.
    await Promise.resolve()
    await Promise.resolve()
    document.body.getBoundingClientRect()
    workTimes.push(performance.now() - began)
    const now = await frame()
    frameTimes.push(now - before)
    before = now
  }
  fire(window, 'mouseup', start.x, start.y)
  await settle(4)
  return { frame: frameTimes, work: workTimes }
}
