import { parseTag, TAG_KIND_LABELS, tagProblemSentence } from '#shared/domain/tag'

/**
 * A unit's address may be typed any way a tag may: it is led to the compact form, and a wrong character is said to be
 * one rather than "not found".
 */
export default defineNuxtRouteMiddleware((to) => {
  const nuxtApp = useNuxtApp()
  // The server has already judged the address this visit began with; its refusal is the page being hydrated.
  if (import.meta.client && nuxtApp.isHydrating && nuxtApp.payload.serverRendered) return
  const typed = 'tag' in to.params ? to.params.tag : undefined
  if (typeof typed !== 'string' || !to.path.startsWith('/units/')) return
  const read = parseTag(typed)
  if (!read.ok) return abortNavigation(createError({ statusCode: 404, message: tagProblemSentence(read.reason), fatal: true }))
  if (read.kind !== 'U') {
    const message = `${typed} is the tag of a ${TAG_KIND_LABELS[read.kind].toLowerCase()}, not of a unit.`
    return abortNavigation(createError({ statusCode: 404, message, fatal: true }))
  }
  if (typed !== read.tag) {
    const rest = to.path.slice('/units/'.length).split('/').slice(1)
    return navigateTo({ path: ['/units', read.tag, ...rest].join('/'), query: to.query, hash: to.hash }, { redirectCode: 301, replace: true })
  }
})
