import type { Page } from '#shared/schemas/common'
import type { ReviewItem } from '#shared/schemas/reviews'

const ADDRESS = '/api/reviews?limit=20'

/** Run sheets that wait for a reviewer, the longest waiting first. */
export const useReviews = () => useResource<Page<ReviewItem>>(ADDRESS)

/** Further pages of them. */
export const useReviewPages = (first: Ref<Page<ReviewItem> | undefined>) =>
  useLaterPages(first, (cursor) => `${ADDRESS}&cursor=${cursor}`)
