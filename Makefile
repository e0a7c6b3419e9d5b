# Two commands for a newcomer: `make chart` and `make test`. Each installs what is missing (.ci/setup), builds, and runs.
JOBS := $(shell nproc)

.PHONY: chart test lint sanitize bench clean

chart:
	@.ci/setup chart
	@cmake --preset command > build/command.log 2>&1 || (cat build/command.log; false)
	@cmake --build --preset command --parallel $(JOBS)
	@build/command/zeotrope chart R-454B

test:
	@.ci/setup test
	cmake --preset release
	cmake --build --preset release --parallel $(JOBS)
	CMAKE_BUILD_PARALLEL_LEVEL=$(JOBS) build/venv/bin/pip install --quiet '.[test]'
	ctest --preset release --parallel 2
	ZEOTROPE_COMMAND=build/release/zeotrope ZEOTROPE_BUILD=build/release build/venv/bin/python -m pytest -q tests

# warnings of clang 14 and clang-tidy; both clean
lint:
	@.ci/setup lint
	cmake --preset clang
	cmake --build --preset clang --parallel $(JOBS)
	.ci/tidy build/clang

# the C++ tests under AddressSanitizer and UndefinedBehaviorSanitizer
sanitize:
	@.ci/setup test
	cmake --preset sanitize
	cmake --build --preset sanitize --parallel $(JOBS)
	ctest --preset sanitize --parallel 2

bench:
	@.ci/setup bench
	cmake --preset release -DZEOTROPE_BENCH=ON
	cmake --build --preset release --parallel $(JOBS)
	build/release/bench/zeotrope_bench

clean:
	rm -rf build
