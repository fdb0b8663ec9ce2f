import { flushPromises } from '@vue/test-utils'
import { beforeEach, describe, expect, it } from 'vitest'
import { defineComponent, h, provide, ref, shallowRef } from 'vue'
import { openBuildKey } from '../../../../src/components/diagram/openBuild.ts'
import DrivesFace from '../../../../src/components/drives/DrivesFace.vue'
import ImportDrivesDialog from '../../../../src/components/drives/ImportDrivesDialog.vue'
import { pastedListing } from '../../../../src/components/drives/pastedListing.ts'
import { useDiagramStore } from '../../../../src/stores/diagram.ts'
import { fakeServer, irma, json, sessionOf } from '../../helpers/fakeServer.ts'
import { mountPage, words } from '../../helpers/mountPage.ts'
import { exampleBuild, shippedCatalog } from '../../helpers/shippedCatalog.ts'

const catalog = shippedCatalog()
const example = exampleBuild('projection-24', catalog)

const found = {
  buildId: 'b2',
  buildName: 'Cold vault',
  machine: null,
  partId: 'p9',
  ref: 'C4',
  bay: 4,
  serial: 'FRESH777',
  wwn: '',
  makerModel: '',
}
const show = async (component: typeof DrivesFace | typeof ImportDrivesDialog, mayEdit = true) => {
  fakeServer({
    'GET /api/session': json(sessionOf(irma)),
    'GET /api/drives': () => json({ items: [found], more: false }),
  })
  await mountPage(
    defineComponent({
      setup() {
        useDiagramStore().open('b1', example, catalog, mayEdit)
        const state = ref({ kind: 'saved' as const, revision: 3 })
        provide(openBuildKey, { buildId: 'b1', summary: shallowRef(null), state })
        return () => h(component)
      },
    }),
  )
  return useDiagramStore()
}
const drive = (ref: string) => useDiagramStore().document?.parts.find((part) => part.ref === ref)
const field = (label: string) => document.querySelector<HTMLInputElement>(`[aria-label="${label}"]`)
const press = async (name: string) => {
  const button = [...document.querySelectorAll('button')].find((one) => words(one) === name)
  if (!button) throw new Error(`no button ${name}`)
  button.click()
  await flushPromises()
}
const type = async (control: HTMLInputElement | HTMLTextAreaElement | null, value: string, event = 'change') => {
  if (!control) throw new Error('no such field')
  control.value = value
  control.dispatchEvent(new Event(event, { bubbles: true }))
  await flushPromises()
}

beforeEach(() => {
  pastedListing.value = ''
})

describe('the table of drives', () => {
  it('finds a drive by a part of its serial', async () => {
    await show(DrivesFace)
    expect(document.querySelectorAll('tbody tr')).toHaveLength(25)
    await type(document.querySelector('input[type=search]'), '24103', 'input')
    expect(document.querySelectorAll('tbody tr')).toHaveLength(1)
    expect(field('Serial of C3')?.value).toBe('RVP124103')
  })

  it('writes a serial in place, as one edit', async () => {
    const diagram = await show(DrivesFace)
    await type(field('Serial of C3'), ' NEW1 ')
    expect(drive('C3')?.serial).toBe('NEW1')
    diagram.undo()
    expect(drive('C3')?.serial).toBe('RVP124103')
  })

  it('has nothing to write in for a reader', async () => {
    await show(DrivesFace, false)
    expect(document.querySelectorAll('tbody input, tbody select')).toHaveLength(0)
    expect(words()).toContain('RVP124103')
  })
})

describe('the import', () => {
  const listing = 'serial,bay\nRVP124101,1\nFRESH777,2\n'

  it('warns of a serial of another build, and of one against another', async () => {
    await show(ImportDrivesDialog)
    await type(document.querySelector('textarea'), listing, 'input')
    await press('Read the listing')
    expect(words()).toContain('This serial stands in another build of yours: Cold vault, C4, bay 4.')
    expect(words()).toContain('C2 has serial RVP124102 in the build, FRESH777 in the listing.')
    expect(words().match(/another build of yours/g)).toHaveLength(1)
    expect(drive('C2')?.serial).toBe('RVP124102')
  })

  it('keeps what was pasted when it is closed', async () => {
    await show(ImportDrivesDialog)
    await type(document.querySelector('textarea'), listing, 'input')
    expect(pastedListing.value).toBe(listing)
  })

  it('says what of it cannot be read, and where', async () => {
    await show(ImportDrivesDialog)
    await type(document.querySelector('textarea'), '{ "device": ', 'input')
    await press('Read the listing')
    expect(words()).toContain('1 entry could not be read')
    expect(words()).toContain('line 1: This is not JSON')
  })
})
