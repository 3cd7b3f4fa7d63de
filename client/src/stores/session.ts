import { defineStore } from 'pinia'
import { computed, readonly, ref, shallowRef } from 'vue'
import type { Role } from '#shared/contracts/endpoint'
import type { SessionPerson } from '#shared/contracts/people'

export const useSessionStore = defineStore('session', () => {
  const person = shallowRef<SessionPerson | null>(null)
  const expired = ref(false)
  let answer: ((resumed: boolean) => void) | null = null

  const timeZone = computed(() => person.value?.company.timeZone ?? 'UTC')

  function start(signedIn: SessionPerson | null) {
    person.value = signedIn
  }

  function hasRole(...roles: readonly Role[]) {
    return person.value?.roles.some((role) => roles.includes(role)) ?? false
  }

  /** Opens the dialog over whatever is on the sheet; true when the same person has signed in again. */
  function askAgain(): Promise<boolean> {
    if (!person.value) return Promise.resolve(false)
    expired.value = true
    return new Promise((resolve) => {
      answer = resolve
    })
  }

  function resume(signedIn: SessionPerson) {
    start(signedIn)
    settle(true)
  }

  function giveUp() {
    settle(false)
  }

  function settle(resumed: boolean) {
    expired.value = false
    answer?.(resumed)
    answer = null
  }

  return { person, expired: readonly(expired), timeZone, start, hasRole, askAgain, resume, giveUp }
})
