"""Text -> lowered kernel. Alone knows the compiler's library; reads nothing that it is not given."""

from beatwise.frontend.program import NoSuchTop, read_program

__all__ = ["NoSuchTop", "read_program"]
