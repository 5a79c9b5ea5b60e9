# How barnwright is installed, shown, tested and checked. Everything lives in .venv, build and out.

SHELL := /bin/bash
.SHELLFLAGS := -eu -o pipefail -c
.DEFAULT_GOAL := help
.DELETE_ON_ERROR:

# The bundled plugins: installed by path, like a stranger's.
PLUGINS := plugins/electroweak plugins/nuclear plugins/qed plugins/resonances

VENV := .venv
PY := $(VENV)/bin/python
PIP := $(PY) -m pip --disable-pip-version-check
INSTALL := $(PIP) install -qq -c constraints.txt
STAMPS := $(VENV)/stamps
WHEELS := build/wheels

# Stamps carry a digest of what they stand for: a second run with the same sources does nothing.
digest = $(shell find $(1) -type f -not -name '*.pyc' | LC_ALL=C sort | xargs cksum | cksum | tr -d " ")
SOURCES := $(call digest,src $(PLUGINS) pyproject.toml README.md LICENSE)
PINS := $(call digest,pyproject.toml constraints.txt)
MADE := $(STAMPS)/made-$(PINS)
BUILT := $(STAMPS)/built-$(SOURCES)
FOR_DEMO := $(STAMPS)/demo-$(PINS)
FOR_DEVELOPERS := $(STAMPS)/developers-$(PINS)

PROTO_PY := .venv-proto/bin/python
PROTO_MADE := .venv-proto/made-$(call digest,tools/stubs-requirements.txt)

.PHONY: help demo test check lint types imports dependencies stubs protos proto proto-image lowest constraints snapshots bench statistics clean

help:  ## Show this list
	@sed -nE 's/^([a-z-]+):.*##/\1\t/p' $(MAKEFILE_LIST) | expand -t 16

demo: $(BUILT) $(FOR_DEMO)  ## Start a server, ask it for a prediction, print the table, draw the picture (under 3 minutes)
	@$(PY) examples/demo.py out/demo

test: $(BUILT) $(FOR_DEVELOPERS)  ## Run every group of tests against the built wheels (under 10 minutes on 2 cores)
	@$(PY) tools/run_tests.py

check:  ## Run the gates: style, types, rows of the house, dependencies, stubs, protos
	@$(MAKE) --no-print-directory --keep-going lint types imports dependencies stubs protos

lint: $(FOR_DEVELOPERS)
	$(PY) -m ruff check
	$(PY) -m ruff format --check

types: $(FOR_DEVELOPERS)
	$(PY) -m mypy

imports: $(FOR_DEVELOPERS)
	PYTHONPATH=src$(subst $() ,,$(addsuffix /src,$(addprefix :,$(PLUGINS)))) $(VENV)/bin/lint-imports --no-cache

dependencies: $(FOR_DEVELOPERS)
	$(VENV)/bin/deptry src

stubs: $(PROTO_MADE)
	$(PROTO_PY) tools/stubs.py --check

protos: $(FOR_DEVELOPERS)
	$(VENV)/bin/buf lint protos
	$(VENV)/bin/buf breaking protos --against protos/image.binpb

proto: $(PROTO_MADE)  ## Write the stubs of protos/ anew
	$(PROTO_PY) tools/stubs.py

proto-image: $(FOR_DEVELOPERS)  ## At a release: freeze protos/ as the image that later changes must not break
	$(VENV)/bin/buf build protos --exclude-source-info -o protos/image.binpb

lowest: $(BUILT)  ## At a release: run the tests with the oldest versions that pyproject.toml allows
	rm -rf build/lowest && $(PY) -m venv build/lowest
	$(PY) tools/floors.py > build/floors.txt
	build/lowest/bin/python -m pip install -qq -r build/floors.txt $(WHEELS)/*.whl
	build/lowest/bin/python -m pytest -q --deselect tests/house/test_surface.py::test_help_texts_are_pinned

constraints: $(BUILT)  ## At a release: pin the newest versions that fit pyproject.toml
	rm -rf build/newest && $(PY) -m venv build/newest
	build/newest/bin/python -m pip install -qq "$$(echo $(WHEELS)/barnwright-*.whl)[service,plot,dev]"
	echo "# What CI installed and tested: pip install -c constraints.txt ..." > constraints.txt
	build/newest/bin/python -m pip freeze | grep -v '^barnwright' >> constraints.txt

snapshots: $(BUILT) $(FOR_DEVELOPERS)  ## Accept the present public names and help texts as the pinned ones
	UPDATE_SNAPSHOTS=1 $(PY) -m pytest -q tests/house

bench: $(BUILT) $(FOR_DEVELOPERS)  ## Measure: ratios against plain numpy loops in the same run
	@for file in benchmarks/bench_*.py; do $(PY) "$$file"; done

statistics: $(BUILT) $(FOR_DEVELOPERS)  ## The slow studies: property tests with fresh seeds and many more examples
	HYPOTHESIS_PROFILE=statistics $(PY) -m pytest -q --timeout 3600 -m hypothesis

clean:  ## Remove what was made: .venv, build, out, caches
	rm -rf $(VENV) .venv-proto build dist out .mypy_cache .ruff_cache .pytest_cache .hypothesis

$(MADE):
	@echo "making $(VENV)" >&2
	@python=$$(tools/find-python $(PYTHON)); [ -x $(PY) ] || "$$python" -m venv $(VENV)
	@$(INSTALL) hatchling
	@mkdir -p $(STAMPS); touch $@

$(BUILT): $(MADE)
	@echo "building and installing the wheels of barnwright and $(PLUGINS)"
	@rm -rf $(WHEELS)
	@$(PIP) wheel -qq --no-deps --no-build-isolation -w $(WHEELS) $(addprefix ./,. $(PLUGINS))
	@$(PIP) install -qq --no-deps --force-reinstall $(WHEELS)/*.whl
	@rm -f $(STAMPS)/built-*; touch $@

$(FOR_DEMO): | $(BUILT)
	@echo "installing what the demo needs"
	@$(INSTALL) "$$(echo $(WHEELS)/barnwright-*.whl)[service,plot]"
	@touch $@

$(FOR_DEVELOPERS): | $(BUILT)
	@echo "installing what tests and gates need"
	@$(INSTALL) "$$(echo $(WHEELS)/barnwright-*.whl)[service,plot,dev]"
	@touch $@

$(PROTO_MADE):
	@echo "making .venv-proto, which writes the stubs"
	@rm -rf .venv-proto
	@python=$$(tools/find-python $(PYTHON)); "$$python" -m venv .venv-proto
	@$(PROTO_PY) -m pip --disable-pip-version-check install -qq -r tools/stubs-requirements.txt
	@touch $@
