import type { Permission } from '@/lib/domain/actor';
import type { CommandKind } from '@/lib/domain/orders/commands';
import type { Side, Status } from '@/lib/domain/orders/facts';

/** What one command asks before anything else, and the words it goes by. */
export interface OrderRule {
  readonly side: Side | 'either';
  readonly permission: Permission;
  readonly from: readonly Status[];
  /** On the button. */
  readonly label: string;
  /** In the history: "Kestrel … agreed the price". */
  readonly past: string;
}

const UNTIL_CUT: readonly Status[] = ['sent', 'quoted', 'agreed', 'cutting'];
/** A price for the work may follow an agreed inspection fee. */
const PRICED: readonly Status[] = ['quoted', 'agreed', 'cutting'];
const UNTIL_REPORTED: readonly Status[] = [...UNTIL_CUT, 'reported'];
const PARTS_AWAY: readonly Status[] = [
  ...UNTIL_REPORTED,
  'accepted',
  'rejected',
  'declined',
  'withdrawn',
  'cancelled',
  'closed',
];

/** The whole life of a work order. Buttons, checks, help text and tests all read this one table. */
export const ORDER_RULES = {
  send: { side: 'sender', permission: 'order', from: ['draft'], label: 'Send', past: 'sent the order' },
  change: {
    side: 'sender',
    permission: 'order',
    from: ['sent', 'quoted'],
    label: 'Change the order',
    past: 'changed the order',
  },
  withdraw: {
    side: 'sender',
    permission: 'order',
    from: ['sent', 'quoted'],
    label: 'Withdraw',
    past: 'withdrew the order',
  },
  quote: {
    side: 'partner',
    permission: 'price',
    from: UNTIL_CUT,
    label: 'Name a price',
    past: 'named a price',
  },
  decline: {
    side: 'partner',
    permission: 'price',
    from: ['sent', 'quoted'],
    label: 'Decline the job',
    past: 'declined the job',
  },
  ask: {
    side: 'sender',
    permission: 'price',
    from: PRICED,
    label: 'Ask about the price',
    past: 'asked about the price',
  },
  turn_down: {
    side: 'sender',
    permission: 'price',
    from: PRICED,
    label: 'Turn it down',
    past: 'turned the price down',
  },
  agree: {
    side: 'sender',
    permission: 'price',
    from: PRICED,
    label: 'Agree the price',
    past: 'agreed the price',
  },
  expire: {
    side: 'partner',
    permission: 'price',
    from: ['quoted'],
    label: 'Let it run out',
    past: 'let the price run out',
  },
  cancel: {
    side: 'either',
    permission: 'order',
    from: ['agreed', 'cutting', 'reported'],
    label: 'Cancel the order',
    past: 'cancelled the order',
  },
  settle: {
    side: 'partner',
    permission: 'price',
    from: ['cancelled'],
    label: 'Say what is owed',
    past: 'said what is owed',
  },
  answer_settlement: {
    side: 'sender',
    permission: 'price',
    from: ['cancelled'],
    label: 'Answer what is owed',
    past: 'answered what is owed',
  },
  release: {
    side: 'sender',
    permission: 'sizes',
    from: ['sent', 'quoted', 'agreed', 'cutting'],
    label: 'Release these sizes',
    past: 'released sizes',
  },
  repeat_back: {
    side: 'partner',
    permission: 'sizes',
    from: UNTIL_CUT,
    label: 'Repeat the sizes back',
    past: 'repeated the sizes back',
  },
  move_parts: {
    side: 'either',
    permission: 'parts',
    from: PARTS_AWAY,
    label: 'Move the parts',
    past: 'moved parts',
  },
  restamp: {
    side: 'partner',
    permission: 'parts',
    from: UNTIL_REPORTED,
    label: 'Restamp a piece',
    past: 'restamped a piece',
  },
  hold: { side: 'either', permission: 'hold', from: UNTIL_REPORTED, label: 'Hold', past: 'put a hold on' },
  answer_hold: {
    side: 'either',
    permission: 'hold',
    from: UNTIL_REPORTED,
    label: 'Answer the hold',
    past: 'answered a hold',
  },
  lift_hold: {
    side: 'either',
    permission: 'hold',
    from: UNTIL_REPORTED,
    label: 'Lift the hold',
    past: 'lifted a hold',
  },
  move_promise: {
    side: 'partner',
    permission: 'price',
    from: ['agreed', 'cutting'],
    label: 'Move the promise',
    past: 'moved the promise',
  },
  start: {
    side: 'partner',
    permission: 'cut',
    from: ['agreed', 'cutting'],
    label: 'Put it on the machine',
    past: 'began a line',
  },
  answer_stop: {
    side: 'partner',
    permission: 'cut',
    from: ['cutting'],
    label: 'Say what is already cut',
    past: 'said what is already cut',
  },
  report: {
    side: 'partner',
    permission: 'cut',
    from: ['cutting'],
    label: 'Report it finished',
    past: 'reported the work finished',
  },
  raise_snag: {
    side: 'partner',
    permission: 'snag',
    from: UNTIL_REPORTED,
    label: 'Raise a snag',
    past: 'raised a snag',
  },
  approve_snag: {
    side: 'sender',
    permission: 'decide',
    from: UNTIL_REPORTED,
    label: 'Approve',
    past: 'approved a snag',
  },
  ask_snag: {
    side: 'sender',
    permission: 'decide',
    from: UNTIL_REPORTED,
    label: 'Ask',
    past: 'asked about a snag',
  },
  reply_snag: {
    side: 'partner',
    permission: 'snag',
    from: UNTIL_REPORTED,
    label: 'Answer',
    past: 'answered about a snag',
  },
  decline_snag: {
    side: 'sender',
    permission: 'decide',
    from: UNTIL_REPORTED,
    label: 'Decline',
    past: 'declined a snag',
  },
  decide: {
    side: 'sender',
    permission: 'decide',
    from: ['reported'],
    label: 'Check and decide',
    past: 'decided on the work',
  },
} as const satisfies Record<CommandKind, OrderRule>;

export const COMMAND_KINDS = Object.keys(ORDER_RULES) as readonly CommandKind[];

/** Statuses from which nothing can be cut any more. */
export const ENDED: readonly Status[] = ['closed', 'declined', 'withdrawn', 'cancelled'];
