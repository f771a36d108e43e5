import { expose } from "comlink";
import { WARM_UP_DOCUMENT } from "@/lib/scenario/defaults";
import { EngineTasks } from "./engine-tasks";

const channel = new MessageChannel();
const pause = () =>
  new Promise<void>((resolve) => {
    channel.port1.onmessage = () => resolve();
    channel.port2.postMessage(null);
  });

const tasks = new EngineTasks(pause, () => performance.now());
tasks.warm(WARM_UP_DOCUMENT);
expose(tasks);
