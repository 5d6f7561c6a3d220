#!/usr/bin/env python3
"""The door to building, serving, testing and measuring gasbasis.

    python3 build.py serve [--port N]   build what is out of date, serve the page on this machine
    python3 build.py build              build what is out of date into dist/
    python3 build.py test [pytest arguments]   build, then run every test, browser and Pyodide included
    python3 build.py bench              build, then measure the page

Needs Python 3.11 or newer and Node with npm; makes the rest itself. The parts are in pycore/making/.
"""
from __future__ import annotations

import argparse
import sys
import time
from pathlib import Path

sys.dont_write_bytecode = True
sys.path.insert(0, str(Path(__file__).resolve().parent / "pycore"))

from making.places import Places  # noqa: E402  (the path must be set first)
from making.steps import BuildFailed, one_at_a_time, say  # noqa: E402


def build(places: Places = Places()):
    """Everything up to dist/. Returns the runtime that went into it."""
    from making import sizes, site, toolchain, wheel
    from making.runtime import build_runtime
    started = time.monotonic()
    with one_at_a_time(Places().work):
        toolchain.venv()
        toolchain.install_locked("build")
        toolchain.install_locked("page")
        built = wheel.build_wheel(places)
        wheel.install_wheel(built)
        runtime = build_runtime(built, places)
        site.build_site(runtime, places)
    sizes.report(places.dist)
    say(f"built {places.dist.name}/ in {time.monotonic() - started:.1f} s")
    return runtime


def only_build(arguments: argparse.Namespace) -> int:
    build()
    return 0


def serve(arguments: argparse.Namespace) -> int:
    from making import server
    build()
    server.serve(Places().dist, first_port=arguments.port or server.FIRST_PORT)
    return 0


def test(arguments: argparse.Namespace) -> int:
    from making import testing
    return testing.run_tests(build(), Places(), arguments.pytest)


def bench(arguments: argparse.Namespace) -> int:
    from making import bench as measuring
    return measuring.run_bench(build(), Places())


def main() -> int:
    parser = argparse.ArgumentParser(description=__doc__, formatter_class=argparse.RawDescriptionHelpFormatter)
    commands = parser.add_subparsers(dest="command", required=True)
    commands.add_parser("build", help="build dist/").set_defaults(run=only_build)
    serving = commands.add_parser("serve", help="build and serve the page on this machine")
    serving.add_argument("--port", type=int, help="the first port to try")
    serving.set_defaults(run=serve)
    testing = commands.add_parser("test", help="build and run every test")
    testing.set_defaults(run=test)
    commands.add_parser("bench", help="build and measure the page").set_defaults(run=bench)
    arguments, further = parser.parse_known_args()
    arguments.pytest = further
    if further and arguments.run is not test:
        parser.error(f"not understood: {' '.join(further)}")
    try:
        return arguments.run(arguments)
    except BuildFailed as failure:
        print(f"\n{failure}", file=sys.stderr)
        return 1


if __name__ == "__main__":
    sys.exit(main())
