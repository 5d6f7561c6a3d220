"""The content security policy: its one home. The page carries it as <meta>, the server and the service worker as a header."""

POLICY = ("default-src 'none'; script-src 'self' 'wasm-unsafe-eval'; connect-src 'self'; worker-src 'self' blob:; "
          "style-src 'self'; img-src 'self' data:; manifest-src 'self'; base-uri 'none'; form-action 'none'")
