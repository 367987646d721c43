const safetyItemIds: ReadonlySet<string> = new Set([
  ...['W06', 'W08', 'W16', 'W21'],
  ...['T01', 'T02', 'T03', 'T04', 'T05', 'T06', 'T08'],
  'H08',
])

/**
 * Whether what is printed with an item of the library warns of harm (blades, pain, a tiring arm, a child punished for
 * a hand) or is only something to bear in mind. Which items warn is this clinic's choice (no source).
 */
export const isSafetyAdvice = (itemId: string): boolean => safetyItemIds.has(itemId)
