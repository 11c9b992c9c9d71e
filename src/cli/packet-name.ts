/** Whether a file is to be read as a packet, or as a report that may carry one. */
export const isPacketName = (path: string): boolean => /\.(?:zip|html?)$/i.test(path);
