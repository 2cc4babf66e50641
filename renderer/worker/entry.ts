/** Entry of the module worker. */
import { decodeRequest } from './decodeMessages'
import { serve } from './serve'

serve({
  post: (message, handedOver = []) => self.postMessage(message, [...handedOver]),
  listen: (listener) =>
    self.addEventListener('message', (event: MessageEvent<unknown>) => {
      const request = decodeRequest(event.data)
      if (request !== null) listener(request)
    }),
})
