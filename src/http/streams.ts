/** How long a handler may take that streams for as long as its peer does: a rig's shift, a dashboard's day. */
export const A_DAY_MS = 86_400_000;
