/** One line said after moving on to the next page ("Modification logged"), gone with the page after. */
export function useFlash() {
  const message = useState<{ text: string, shown: boolean } | null>('flash', () => null)
  function say(text: string) {
    message.value = { text, shown: false }
  }
  return { message, say }
}
