"""Accesses in, traffic out: how each walks, which bursts that makes, what it gets. Knows no source text, no rules."""

from __future__ import annotations

from beatwise.traffic.rates import Measured, measure

__all__ = ["Measured", "measure"]
