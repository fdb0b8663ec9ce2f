import { describe, expect, it } from 'vitest'
import { admit, innerPath, type Access } from '../../../src/router/access.ts'
import { routes } from '../../../src/router/routes.ts'

const visitor = { signedIn: false, administrator: false, guestOf: null }
const guest = { ...visitor, guestOf: 'b1' }
const member = { ...visitor, signedIn: true }
const administrator = { ...member, administrator: true }
const page = (access: Access | undefined, fullPath = '/builds/b1', query = {}) => ({
  meta: { access },
  fullPath,
  query,
  name: 'build',
  params: { buildId: 'b1' },
})

describe('a page', () => {
  it('without a word on access is for people who are signed in', () => {
    expect(admit(page(undefined), visitor)).toEqual({ name: 'sign-in', query: { next: '/builds/b1' } })
    expect(admit(page(undefined), member)).toBe(true)
  })

  it('for the administrator looks like no page to others', () => {
    expect(admit(page('administrator'), member)).toMatchObject({ name: 'not-found' })
    expect(admit(page('administrator'), visitor)).toMatchObject({ name: 'sign-in' })
    expect(admit(page('administrator'), administrator)).toBe(true)
  })

  it('for guests sends people on who are signed in already', () => {
    expect(admit(page('guest'), visitor)).toBe(true)
    expect(admit(page('guest'), member)).toEqual({ name: 'builds' })
    expect(admit(page('guest', '/sign-in', { next: '/catalog' }), member)).toBe('/catalog')
  })

  it('of a build is open to guests of that very build', () => {
    expect(admit(page('build'), guest)).toBe(true)
    expect(admit(page('build'), { ...guest, guestOf: 'b2' })).toMatchObject({ name: 'sign-in' })
    expect(admit(page('build'), visitor)).toMatchObject({ name: 'sign-in' })
    expect(admit(page(undefined), guest)).toMatchObject({ name: 'sign-in' })
    expect(admit(page('administrator'), guest)).toMatchObject({ name: 'sign-in' })
  })

  it('of all builds takes a guest to theirs', () => {
    expect(admit({ ...page(undefined), name: 'builds' }, guest)).toEqual({ name: 'build', params: { buildId: 'b1' } })
  })

  it('for anybody is open to all', () =>
    expect([visitor, member, administrator].map((who) => admit(page('anybody'), who))).toEqual([true, true, true]))
})

describe('the way on after signing in', () => {
  it('stays within the app', () => {
    expect(innerPath('/builds?search=a')).toBe('/builds?search=a')
    for (const evil of [
      'https://elsewhere.example',
      '//elsewhere.example',
      '/\\elsewhere.example',
      'builds',
      ['/a'],
      undefined,
    ])
      expect(innerPath(evil)).toBeUndefined()
  })
})

describe('the routes', () => {
  it('open to visitors are just these', () => {
    const open = routes.filter((route) => route.meta?.access === 'anybody' || route.meta?.access === 'guest')
    expect(open.map((route) => route.name).sort()).toEqual(
      [
        'ask-reset',
        'catalog',
        'connector-type',
        'invitation',
        'link',
        'model',
        'not-found',
        'register',
        'reset-password',
        'rule',
        'rules',
        'sign-in',
        'unsubscribe',
      ].sort(),
    )
  })

  it('all have a title and a name of their own', () => {
    const pages = routes.filter((route) => route.component)
    expect(pages.filter((route) => !route.meta?.title)).toEqual([])
    expect(new Set(routes.map((route) => route.name)).size).toBe(routes.length)
  })
})
