/** What a tablet of the shop may be: a clock at the door or the bench, or the computer beside a flow bench. */
export const DEVICE_KINDS = ["clock", "bench"] as const;
export type DeviceKind = (typeof DEVICE_KINDS)[number];

export const isDeviceKind = (kind: string): kind is DeviceKind => (DEVICE_KINDS as readonly string[]).includes(kind);
