"""Lowered kernel -> accesses and stream operations. Knows neither libclang nor boards."""

from beatwise.trace.tracer import trace_program

__all__ = ["trace_program"]
