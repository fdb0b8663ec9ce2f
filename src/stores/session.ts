import { defineStore } from 'pinia'
import { computed, ref } from 'vue'
import type { GuestSession } from '#shared/contract/guest.ts'
import type { Session, User } from '#shared/contract/session.ts'
import * as accounts from '../api/accounts.ts'
import { leaveAsGuest } from '../api/buildLinks.ts'
import * as api from '../api/session.ts'

/** Who is signed in here. */
export const useSessionStore = defineStore('session', () => {
  const session = ref<Session>()
  const user = computed<User | null>(() => session.value?.user ?? null)
  /** Somebody who came by a link, where nobody is signed in. */
  const guest = computed<GuestSession | null>(() => (user.value ? null : (session.value?.guest ?? null)))
  /** The link by which somebody was a guest here no longer lets them in. */
  const visitEnded = computed(() => session.value?.visitEnded ?? false)
  const isAdministrator = computed(() => user.value?.role === 'administrator')
  const editsCatalog = computed(() => isAdministrator.value || user.value?.role === 'catalog-editor')

  /** The session ended under a page in use. The page stays as it is, unsaved work included. */
  const hasEnded = ref(false)
  /** The dialog over the page is open; settles when the person signs in again or declines. */
  const asksAgain = ref(false)
  let answerAgain: ((signedIn: boolean) => void) | undefined
  let again: Promise<boolean> | undefined

  async function load(): Promise<void> {
    session.value = await api.readSession()
  }

  /** A fresh token for the next request. Whoever sits here stays, also where the session itself has ended. */
  async function renewToken(): Promise<void> {
    const fresh = await api.readSession()
    session.value = { ...fresh, user: user.value ?? fresh.user }
  }

  /** Loads once; later calls are free. */
  async function ensure(): Promise<void> {
    if (!session.value) await load()
  }

  async function signIn(email: string, password: string): Promise<void> {
    session.value = await api.signIn(email, password)
    settleAgain(true)
  }

  async function register(account: { email: string; name: string; password: string }): Promise<void> {
    session.value = await accounts.register(account)
  }

  async function signOut(): Promise<void> {
    await api.signOut()
    await load()
  }

  async function leave(): Promise<void> {
    await leaveAsGuest()
    await load()
  }

  function rename(renamed: User): void {
    if (session.value) session.value = { ...session.value, user: renamed }
  }

  /** Asks to sign in over the page, once for all requests refused meanwhile; not again once it was declined. */
  function signInAgain(): Promise<boolean> {
    if (guest.value) return load().then(() => false)
    if (!user.value || (hasEnded.value && !asksAgain.value)) return Promise.resolve(false)
    return askAgain()
  }

  function askAgain(): Promise<boolean> {
    hasEnded.value = true
    asksAgain.value = true
    again ??= new Promise<boolean>((resolve) => (answerAgain = resolve))
    return again
  }

  function settleAgain(signedIn: boolean): void {
    if (signedIn) hasEnded.value = false
    asksAgain.value = false
    answerAgain?.(signedIn)
    answerAgain = undefined
    again = undefined
  }

  return {
    session,
    user,
    guest,
    visitEnded,
    isAdministrator,
    editsCatalog,
    hasEnded,
    asksAgain,
    load,
    ensure,
    renewToken,
    signIn,
    register,
    signOut,
    leave,
    rename,
    signInAgain,
    askAgain,
    settleAgain,
  }
})
