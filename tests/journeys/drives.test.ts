import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { useBrowser } from '../helpers/browser.ts'
import { startProduct, type Product } from '../helpers/server.ts'
import { buildIdOf, signInDemo } from '../helpers/signIn.ts'

/** As `smartctl -x --json` prints a SAS drive, one after the other; serials are invented. */
const listed = (serial: string, more: object = {}) =>
  JSON.stringify(
    {
      smartctl: { version: [7, 4], exit_status: 0 },
      device: { name: '/dev/sda', type: 'scsi', protocol: 'SCSI' },
      scsi_vendor: 'EXAMPLE',
      scsi_product: 'S12T',
      device_type: { scsi_value: 0, name: 'disk' },
      scsi_transport_protocol: { name: 'SAS (SPL-4)', value: 6 },
      serial_number: serial,
      user_capacity: { bytes: 12000138625024 },
      logical_block_size: 512,
      physical_block_size: 4096,
      rotation_rate: 7200,
      ...more,
    },
    null,
    1,
  )

describe('what is in there already', () => {
  const browser = useBrowser()
  let product: Product

  beforeAll(async () => {
    product = await startProduct()
  })
  afterAll(() => product.stop())

  it('reads a listing, shows what does not agree, writes it in as one edit, and finds the drive by its serial', async () => {
    const context = await browser.newContext()
    await signInDemo(context, product.url, 'irma')
    const id = await buildIdOf(context, product.url, 'Projection room')
    const page = await context.newPage()
    await page.goto(`${product.url}/builds/${id}?show=drives`)
    await page.getByRole('button', { name: 'Import drives…' }).click()
    const listing = page.getByRole('textbox', { name: 'Listing' })
    await listing.fill(
      [
        listed('RVP124101', { logical_unit_id: '0x5000c500abcdef01' }),
        listed('RVP124102', { device: { name: '/dev/sdb', protocol: 'ATA' } }),
        listed('FRESH777'),
        '{ "device": ',
      ].join('\n'),
    )
    await page.getByRole('button', { name: 'Read the listing' }).click()
    await page.getByText('C2 is SAS in the build; the disk says SATA (ATA).').waitFor()
    await page.getByText(/3 drives read: 2 known here, 1 new/).waitFor()
    await page.getByText('1 entry could not be read').waitFor()
    await page.getByRole('combobox', { name: 'What to do with RVP124102' }).selectOption('ignore')
    await page.getByRole('button', { name: 'Write 2 drives into the build' }).click()

    await page.getByText('5000c500abcdef01').waitFor()
    await expect.poll(() => page.getByLabel(/^Serial of C/).evaluateAll(serials)).toContain('FRESH777')
    await page.getByRole('button', { name: 'Undo', exact: true }).first().click()
    await expect.poll(() => page.getByLabel(/^Serial of C/).evaluateAll(serials)).not.toContain('FRESH777')
    await page.getByText('5000c500abcdef01').waitFor({ state: 'detached' })

    await page.goto(`${product.url}/builds`)
    await page.getByRole('searchbox', { name: /serial of a drive/ }).fill('p1241 03')
    await page.getByRole('link', { name: 'Projection room: C3, bay 3' }).click()
    await page.getByRole('heading', { name: 'C3', level: 2 }).waitFor()
  })
})

const serials = (fields: (HTMLElement | SVGElement)[]): string[] =>
  fields.map((field) => (field as HTMLInputElement).value)
