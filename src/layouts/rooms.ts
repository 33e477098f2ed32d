/** The signed-in rooms, in the order in which the bar lists them. */
export const rooms = {
  paddock: { name: 'Paddock', href: '/paddock' },
  barn: { name: 'Tech barn', href: '/barn' },
  crib: { name: 'Gauge crib', href: '/crib' },
  office: { name: 'Race office', href: '/office' },
  panel: { name: 'Panel', href: '/panel' },
} as const;

export type RoomKey = keyof typeof rooms;

/** The rooms of `open`, in the bar's order; unknown keys are left out. */
export const roomLinks = (open: readonly RoomKey[]) =>
  (Object.keys(rooms) as RoomKey[])
    .filter((key) => open.includes(key))
    .map((key) => ({ key, ...rooms[key] }));
