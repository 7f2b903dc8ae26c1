/** One line said after moving on to the next page ("Modification logged"), or on this one; gone with the page after. */
export function useFlash() {
  const message = useState<{ text: string, shown: boolean } | null>('flash', () => null)
  function say(text: string) {
    message.value = { text, shown: false }
  }
  /** Says it on the page that is open. */
  function sayHere(text: string) {
    message.value = { text, shown: true }
  }
  return { message, say, sayHere }
}
