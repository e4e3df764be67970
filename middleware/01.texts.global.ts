/** Texts of the desk's rooms come with the desk alone: a public page does not carry them. */
const rooms = import.meta.glob<Record<string, unknown>>('../i18n/locales/*/{account,bench,desk,entry,mailbox,notices,office,panel,people,registrar}.json', { import: 'default' })

export default defineNuxtRouteMiddleware(async (to) => {
  if (to.meta.layout !== 'desk' && to.meta.texts !== 'desk') return
  const i18n = useNuxtApp().$i18n
  const locale = i18n.locale.value
  await Promise.all(Object.entries(rooms)
    .filter(([path]) => path.includes(`/locales/${locale}/`))
    .map(async ([, load]) => i18n.mergeLocaleMessage(locale, await load())))
})
