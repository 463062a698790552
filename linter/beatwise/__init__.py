"""Beatwise reads HLS kernels and says what each memory access costs in bandwidth, why, and what to change."""

__version__ = "0.1.0"
