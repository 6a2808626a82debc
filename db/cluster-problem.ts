/** A problem with the local database that is told in words a person can act on; its stack trace adds nothing. */
export class ClusterProblem extends Error {}
