import { Choice } from '../../sheet/Choice.tsx'
import { useServices, useView } from '../../state/services.ts'

/** What the stage shows of a study that holds runs and the rate constants made from them. */
export function BasisChoice() {
  const { view } = useServices()
  const basis = useView((state) => state.basis)
  return (
    <Choice
      label="Ea from"
      options={[
        { id: 'runs', text: 'Levels of conversion' },
        { id: 'rate-constants', text: 'Rate constants' },
      ]}
      value={basis}
      onChange={(id) => view.setState({ basis: id })}
    />
  )
}
