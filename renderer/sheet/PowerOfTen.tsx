import { mantissaAndPower } from './scientific.ts'

/** `3.46e-5` set as people print it. */
export function PowerOfTen({ text }: { readonly text: string }) {
  const [mantissa, power] = mantissaAndPower(text)
  if (power === '') return <>{mantissa}</>
  return (
    <>
      {mantissa} × 10<sup>{power}</sup>
    </>
  )
}
