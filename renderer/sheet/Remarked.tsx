import type { ReactNode } from 'react'

/** A number of which there is more to know: that shows when it is pointed at, and is heard. */
export const Remarked = ({ remark, children }: { readonly remark: string | null; readonly children: ReactNode }) =>
  remark === null ? (
    children
  ) : (
    <>
      <span className="has-remark" title={remark}>
        {children}
      </span>
      <span className="visually-hidden">, {remark}</span>
    </>
  )
