import type { CaptureProblem } from '../app/ports.ts';

type Asking = { requestPermission?: () => Promise<string> };

/**
 * Ask for the motion sensor where the browser wants to be asked. Must run synchronously inside a tap. Only 'granted'
 * is a grant: browsers also answer 'prompt', or reject when the tap is too old.
 */
export async function askForMotion(): Promise<'granted' | CaptureProblem> {
  const motion = (globalThis as { DeviceMotionEvent?: Asking }).DeviceMotionEvent;
  if (typeof motion?.requestPermission !== 'function') return 'granted';
  try {
    return (await motion.requestPermission()) === 'granted' ? 'granted' : 'not-allowed';
  } catch {
    return 'not-allowed';
  }
}

/** Calls back when the browser withdraws the sensor while it is used. Returns how to stop watching. */
export function watchPermission(onWithdrawn: () => void): () => void {
  let status: PermissionStatus | undefined;
  let isOver = false;
  const onChange = (): void => {
    if (status !== undefined && status.state !== 'granted') onWithdrawn();
  };
  const query = globalThis.navigator?.permissions?.query({ name: 'accelerometer' as PermissionName });
  query
    ?.then((answer) => {
      if (isOver) return;
      status = answer;
      answer.addEventListener('change', onChange);
    })
    .catch(() => {
      // Browsers without that name: the sensor's own error tells.
    });
  return () => {
    isOver = true;
    status?.removeEventListener('change', onChange);
  };
}
