// The package ships no types; these are the parts used here.
declare module 'autocannon' {
  interface Options { url: string, connections: number, amount: number, timeout: number }
  interface Result { latency: { p50: number, p99: number, max: number }, non2xx: number, errors: number }
  export default function autocannon(options: Options): Promise<Result>
}
