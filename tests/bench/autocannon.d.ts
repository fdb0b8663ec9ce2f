/** The little of autocannon that the bench uses; the package brings no types. */
declare module 'autocannon' {
  interface Options {
    url: string
    headers?: Record<string, string>
    connections?: number
    /** Seconds. */
    duration?: number
  }
  interface Result {
    requests: { average: number }
    non2xx: number
    errors: number
  }
  const run: (options: Options) => Promise<Result>
  export = run
}
