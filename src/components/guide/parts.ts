/** The pieces of work that the guide goes through, in their order. */
export const GUIDE_PARTS = {
  draft: {
    title: 'Drafting a floor',
    summary: 'From the measured edge to a plan that the crew can set out, without a cut unit.',
  },
  agree: {
    title: 'Agreeing on a floor',
    summary: 'From the first look that the client takes to the version that the crew builds from.',
  },
  site: {
    title: 'Building a floor',
    summary: 'From the issued plan to the last course, with what the crew measures on the way.',
  },
} as const;
