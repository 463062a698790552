"""On-chip memory: the shapes of block RAMs, what a buffer or a FIFO takes of them. Widths in bits, depths in words.

Source of the shapes: memory guides UG953 (RAMB18E1, BRAM_SINGLE_MACRO) and UG573.
"""

from __future__ import annotations

from collections.abc import Mapping

BLOCK_36K = {1: 32768, 2: 16384, 4: 8192, 9: 4096, 18: 2048, 36: 1024, 72: 512}  #: width: depth; 72 as simple dual port
BLOCK_18K = {1: 16384, 2: 8192, 4: 4096, 9: 2048, 18: 1024, 36: 512}  #: 36 as simple dual port
SHIFT_REGISTER_BITS = (
    1024  #: a FIFO of no more bits, or of depth 2, is built without blocks (HLS user guide UG1399, 2023.2)
)
SHIFT_REGISTER_DEPTH = 32  #: bits of one LUT as shift register (SRLC32E)
STREAM_DEPTH = 2  #: of a stream whose depth is not given (UG1399)


def depth(width: int, shapes: Mapping[int, int] = BLOCK_36K) -> int:
    """Words of ``width`` bits that one block holds; 0 where a word is wider than the block.

    >>> depth(72), depth(32), depth(8), depth(100)
    (512, 1024, 4096, 0)
    """
    return next((words for wide, words in sorted(shapes.items()) if wide >= width), 0)


def blocks(words: int, width: int, shapes: Mapping[int, int] = BLOCK_36K) -> int:
    """The fewest blocks for ``words`` words of ``width`` bits, all of one shape.

    >>> blocks(256, 512), blocks(512, 512, BLOCK_18K)
    (8, 15)
    """
    return min(-(-width // wide) * -(-words // deep) for wide, deep in shapes.items())


def fifo_blocks(words: int, width: int) -> int:
    """Blocks of 18 Kb that a FIFO takes; 0 where it becomes shift registers.

    >>> fifo_blocks(2, 512), fifo_blocks(512, 32), fifo_blocks(16, 512)
    (0, 1, 15)
    """
    if words <= STREAM_DEPTH or words * width <= SHIFT_REGISTER_BITS:
        return 0
    return blocks(words, width, BLOCK_18K)


def fifo_luts(words: int, width: int) -> int:
    """LUTs of a FIFO that is built as shift registers.

    >>> fifo_luts(32, 64), fifo_luts(33, 64)
    (64, 128)
    """
    return width * -(-words // SHIFT_REGISTER_DEPTH)


def burst_buffer_bits(outstanding: int, burst_beats: int, width: int) -> int:
    """What a port keeps in one direction: outstanding x burst length x width (UG1399, 2020.2).

    >>> burst_buffer_bits(16, 16, 512) // 8 // 1024      # KiB
    16
    """
    return outstanding * burst_beats * width


def burst_buffer_blocks(outstanding: int, burst_beats: int, width: int) -> int:
    """The same in blocks of 36 Kb.

    >>> burst_buffer_blocks(16, 16, 512), burst_buffer_blocks(16, 32, 512), burst_buffer_blocks(32, 32, 512)
    (8, 8, 15)
    """
    return blocks(outstanding * burst_beats, width)
