"""Stream operations: which FIFO, under which loops and guards, in which process."""

from __future__ import annotations

from helpers.lowered import lines
from helpers.traced import accesses, operations


def test_a_pipeline_of_two_processes() -> None:
    found = operations(
        """
        #pragma HLS DATAFLOW
        hls::stream<int> pipe;
        load(in, pipe);
        store(pipe, out);
        """,
        before="""
        #include <hls_stream.h>
        static void load(const int *in, hls::stream<int> &to) {
            load: for (int i = 0; i < 64; ++i) to.write(in[i]);
        }
        static void store(hls::stream<int> &from, int *out) {
            store: for (int i = 0; i < 64; ++i) out[i] = from.read();
        }
        """,
    )
    assert found == lines("""
        write  pipe  load x64  in load
        read  pipe  store x64  in store
    """)


def test_an_array_of_streams_by_an_index_from_data() -> None:
    found = operations(
        """
        hls::stream<int> pipes[4];
        rows: for (int i = 0; i < 64; ++i) pipes[mask[i]] << in[i];
        """,
        before="""
        #include <hls_stream.h>

        """,
    )
    assert found == lines("""
        write  pipes[mask[4*rows]]  rows x64
    """)


def test_a_read_that_does_not_wait() -> None:
    found = operations(
        """
        hls::stream<int> pipe;
        rows: for (int i = 0; i < 64; ++i) {
            int v;
            if (pipe.read_nb(v)) out[i] = v;
            if (!pipe.empty()) out[i] = pipe.read();
        }
        """,
        before="""
        #include <hls_stream.h>

        """,
    )
    assert found == lines("""
        read  pipe  without waiting  rows x64
        test  pipe  rows x64
        read  pipe  rows x64  if not(pipe[])
    """)


def test_a_task_runs_its_function() -> None:
    found = operations(
        """
        #pragma HLS DATAFLOW
        hls::stream<int> first, second;
        feed: for (int i = 0; i < 8; ++i) first.write(in[i]);
        hls::task stage(pump, first, second);
        """,
        before="""
        #include <hls_task.h>
        #include <hls_stream.h>
        static void pump(hls::stream<int> &from, hls::stream<int> &to) { to.write(from.read() + 1); }
        """,
    )
    assert found == lines("""
        write  first  feed x8
        read  first  in pump
        write  second  in pump
    """)


def test_what_a_stream_gave_is_data() -> None:
    found = accesses(
        """
        hls::stream<int> pipe;
        rows: for (int i = 0; i < 64; ++i) out[pipe.read()] = 1;
        """,
        before="""
        #include <hls_stream.h>

        """,
    )
    assert found == lines("""
        write  out[4*pipe[]]  4 B  rows x64
    """)
