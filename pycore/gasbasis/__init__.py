"""gasbasis: restate a trace-gas concentration from the basis it is held on to the basis it is owed on."""

__version__ = "0.1.0"
