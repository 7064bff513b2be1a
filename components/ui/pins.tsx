import type { SpecComponent } from '@/lib/diag/spec-of'

/** The pins of a connector: number, wire colour, what it carries. */
export function Pins({ pins }: { pins: SpecComponent['pins'] }) {
  return (
    <table className="w-full border-collapse text-left">
      <caption className="visually-hidden">Pins of the connector</caption>
      <thead className="text-second text-ink2">
        <tr className="border-b-2 border-ink">
          {['Pin', 'Colour', 'Carries'].map((name) => (
            <th key={name} scope="col" className="py-1 pr-3 font-normal">
              {name}
            </th>
          ))}
        </tr>
      </thead>
      <tbody>
        {pins.map((pin) => (
          <tr key={pin.pin} className="border-b-[1.5px] border-rule align-top">
            <td className="figures py-1 pr-3">{pin.pin}</td>
            <td className="py-1 pr-3 font-bold">{pin.colour}</td>
            <td className="py-1">{pin.carries}</td>
          </tr>
        ))}
      </tbody>
    </table>
  )
}
