"""Blocks that buffers and FIFOs take. Shapes: memory guides UG953 (RAMB18E1, BRAM_SINGLE_MACRO) and UG573."""

from __future__ import annotations

import pytest

from beatwise.memory.onchip import (
    BLOCK_18K,
    BLOCK_36K,
    blocks,
    burst_buffer_bits,
    burst_buffer_blocks,
    depth,
    fifo_blocks,
)


@pytest.mark.parametrize(
    ("widths", "words"),
    [
        ((37, 72), 512),
        ((19, 36), 1024),
        ((10, 18), 2048),
        ((5, 9), 4096),
        ((3, 4), 8192),
        ((2, 2), 16384),
        ((1, 1), 32768),
    ],
)
def test_words_of_a_block_of_36_kb(widths: tuple[int, int], words: int) -> None:
    assert {depth(width) for width in widths} == {words}


def test_words_of_a_block_of_18_kb() -> None:
    assert [depth(width, BLOCK_18K) for width in (1, 18, 36, 37)] == [16384, 1024, 512, 0]


@pytest.mark.parametrize(
    ("words", "width", "wanted"), [(512, 32, 1), (512, 64, 2), (1024, 32, 2), (512, 512, 15), (16, 512, 15)]
)
def test_blocks_of_a_fifo(words: int, width: int, wanted: int) -> None:
    assert fifo_blocks(words, width) == blocks(words, width, BLOCK_18K) == wanted


def test_a_small_fifo_takes_no_block() -> None:
    """HLS user guide UG1399, 2023.2: depth of 2, or 1024 bits in all."""
    assert fifo_blocks(2, 4096) == fifo_blocks(32, 32) == 0
    assert fifo_blocks(33, 32) == 1


def test_buffers_of_bursts() -> None:
    """UG1399: outstanding x burst length x width. AXI burst log, resources at 512 bits: 14 blocks up to 16 x 32, 23 for
    32 x 32; the cost rises only past 512 words, by about one buffer."""
    assert burst_buffer_bits(16, 16, 512) == 16 * 1024 * 8
    assert [burst_buffer_blocks(number, 32, 512) for number in (4, 8, 16, 32)] == [8, 8, 8, 15]
    assert burst_buffer_blocks(32, 32, 512) - burst_buffer_blocks(16, 32, 512) == pytest.approx(23 - 14, abs=2)
    assert blocks(512, 72) == 1 and len(BLOCK_36K) == 7
