import {
  changeHouseAction,
  changeShopAction,
  closeDayAction,
  openDayAction,
} from '@/app/(workspace)/settings/actions';
import { SelectField, SizeField, TextField } from '@/components/forms/fields';
import { Form, Submit } from '@/components/forms/form';
import { Sheet } from '@/components/ui/sheet';
import type { ShopView } from '@/db/read-models/shop';
import { HOUSE_FIELDS, houseText } from '@/lib/domain/operations/house';
import { sayDay } from '@/lib/forms/say';
import { WEEKDAYS } from '@/lib/schemas/shop-settings';

const UNITS = [
  { value: 'in', label: 'Inches' },
  { value: 'mm', label: 'Millimetres' },
];

/** Name, unit, zone and hours. */
export function ShopSheet({ shop }: { shop: ShopView }) {
  const zones = ['UTC', ...Intl.supportedValuesOf('timeZone')].map((value) => ({ value, label: value }));
  const spans = (weekday: number) =>
    shop.hours
      .filter((span) => span.weekday === weekday)
      .map(({ opens, closes }) => `${opens}-${closes}`)
      .join(', ');
  return (
    <Sheet title="The shop">
      <Form action={changeShopAction} version={shop.version} className="grid gap-4" label="The shop">
        <TextField name="name" label="Name" defaultValue={shop.name} />
        <SelectField name="unit" label="You measure in" options={UNITS} defaultValue={shop.unit} />
        <SelectField name="timeZone" label="Time zone" options={zones} defaultValue={shop.timeZone} />
        <fieldset className="grid gap-3 sm:grid-cols-2">
          <legend className="mb-1 text-[15px] font-semibold">Working hours</legend>
          <p className="note sm:col-span-2">
            As 8:00-12:00, 13:00-17:00. Leave a day empty when you are closed. Waiting and promises are
            counted in these hours.
          </p>
          {WEEKDAYS.map((day, index) => (
            <TextField key={day} name={day} label={day} defaultValue={spans(index + 1)} mono />
          ))}
        </fieldset>
        <Submit>Keep</Submit>
      </Form>
    </Sheet>
  );
}

/** Days on which nobody works. */
export function ClosedDaysSheet({ shop, year }: { shop: ShopView; year: number }) {
  return (
    <Sheet title="Closed days" note="They count for no promise and no waiting.">
      <ul className="mb-4">
        {shop.closedDays.map(({ day, note }) => (
          <li key={day} className="flex flex-wrap items-center gap-3 border-b border-rule-2 py-2">
            <b className="font-semibold">{sayDay(day, year)}</b>
            <span className="note">{note}</span>
            <Form
              action={openDayAction}
              hidden={{ day }}
              className="ml-auto"
              label={`Open on ${sayDay(day, year)}`}
            >
              <Submit kind="ghost">Open after all</Submit>
            </Form>
          </li>
        ))}
      </ul>
      <Form action={closeDayAction} className="grid gap-3 sm:grid-cols-2" label="Close on a day">
        <TextField name="day" label="Closed on" type="date" />
        <TextField name="note" label="Because of" />
        <div>
          <Submit kind="ghost">Close on that day</Submit>
        </div>
      </Form>
    </Sheet>
  );
}

/** The shop's own defaults for worksheets. */
export function HouseSheet({ shop }: { shop: ShopView }) {
  const operations = [...new Set(HOUSE_FIELDS.map(({ operation }) => operation))];
  return (
    <Sheet
      title="House defaults"
      note="What a worksheet takes when a box is left empty. An empty box here leaves it to the catalogue. The maker’s data for the engine come before both."
    >
      <Form
        action={changeHouseAction}
        version={shop.version}
        hidden={{ unit: shop.unit }}
        className="grid gap-3"
        label="House defaults"
      >
        {operations.map((operation) => (
          <details key={operation} className="border-b border-rule-2 pb-3">
            <summary className="cursor-pointer py-1 font-semibold">{operation}</summary>
            <div className="mt-2 grid gap-3 sm:grid-cols-2">
              {HOUSE_FIELDS.filter((field) => field.operation === operation).map((field) => (
                <SizeField
                  key={field.key}
                  name={`house:${field.key}`}
                  label={field.label}
                  hint={`Catalogue: ${field.value} in, ${field.source}`}
                  defaultValue={houseText(shop.house, field.key, shop.unit)}
                />
              ))}
            </div>
          </details>
        ))}
        <div>
          <Submit kind="ghost">Keep the defaults</Submit>
        </div>
      </Form>
    </Sheet>
  );
}
