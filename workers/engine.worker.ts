import { expose } from "comlink";
import { WARM_UP_DOCUMENT } from "@/lib/scenario/defaults";
import { EngineTasks } from "./engine-tasks";

// a message to itself comes back after those that wait already: that is the pause, and several may be under way
const channel = new MessageChannel();
const waiting: (() => void)[] = [];
channel.port1.onmessage = () => waiting.shift()?.();
const pause = () =>
  new Promise<void>((resolve) => {
    waiting.push(resolve);
    channel.port2.postMessage(null);
  });

const tasks = new EngineTasks(pause, () => performance.now(), WARM_UP_DOCUMENT);
expose(tasks);
void tasks.warmUp();
