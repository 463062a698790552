"""Boards and their memory: profiles with a source for every fact, and the models of limits. Knows no source code."""

from __future__ import annotations

from beatwise.memory.boards import board, board_names

__all__ = ["board", "board_names"]
