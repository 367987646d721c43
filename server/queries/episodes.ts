/** Id of the newest episode of the child in `column`: a re-referral opens a new one. */
export const latestEpisode = (column: string): string =>
  `(SELECT le.id FROM episodes le WHERE le.childId = ${column}
    ORDER BY le.receivedOn DESC, le.createdAt DESC, le.id LIMIT 1)`
