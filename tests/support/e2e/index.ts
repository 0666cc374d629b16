export { openBrowser, openPage, screenshot, settled, sizes, type PageOptions } from './browser';
export { makeCameraFeed, type LabelPicture } from './camera';
export { readInbox, waitForMail } from './inbox';
export { paymentFakeControl } from './paymentFake';
export { people, signIn } from './people';
export { startStack, type ProcessName, type Stack, type StackOptions } from './stack';
