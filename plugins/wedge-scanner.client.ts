/** A hand scanner that types is understood on any page of those who are signed in. */
export default defineNuxtPlugin({
  name: 'wedge-scanner',
  dependsOn: ['session'],
  setup() {
    const session = useSessionStore()
    const { look } = useScanLookup()
    const notice = useScanNotice()
    listenForWedge(() => session.person !== null, (text) => {
      void look(text).then(async (answer) => {
        notice.value = answer.ok ? null : answer
        if (answer.ok) await navigateTo(answer.thing.href)
      })
    })
  },
})
