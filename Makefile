# levelspan: see README.md for what each target is for. Nothing is written outside this folder, Go's caches, and (make
# test, make desktop) the Debian packages that .ci/deps installs where they are missing.

GO ?= go
VERSION ?= $(shell git describe --tags --always --dirty 2>/dev/null || echo dev)
ADDRESS ?= 127.0.0.1:8080
# How long make run serves: until interrupted at a terminal, a minute without one.
RUN_SECONDS ?= $(shell test -t 0 && echo 0 || echo 60)
FUZZTIME ?= 20s
DEMO = assets/case/marram.json
LINK = -s -w -X main.version=$(VERSION) -X main.release=$(VERSION)
BUILD = $(GO) build -trimpath -buildvcs=false

.PHONY: all run page test check unit node race bench desktop shots fuzz deps clean

all: page

page:
	$(GO) run ./cmd/pagebuild -out dist -version "$(VERSION)"

run: page
	$(GO) run ./cmd/levelspan limits $(DEMO)
	$(GO) run ./cmd/pagebuild -out dist -serve $(ADDRESS) -open -seconds $(RUN_SECONDS)

test: deps check unit node

deps:
	@.ci/deps test

check:
	@unformatted=$$(gofmt -l assets cmd game perf wasm); test -z "$$unformatted" || { echo "not gofmt'd:"; echo "$$unformatted"; exit 1; }
	$(GO) vet ./...
	GOOS=js GOARCH=wasm $(GO) vet ./wasm
	GOOS=windows GOARCH=amd64 $(GO) vet ./cmd/levelspan-window ./game

# The browser and the window are tested in the same run: LEVELSPAN_OUTSIDE=required makes their absence a failure. They
# are built by the tests themselves, so a result that Go remembers would say nothing about them: hence -count=1.
# What drives browsers and windows comes last and one at a time: each wants the processor to itself.
OUTSIDE = ./game/display ./wasm ./wasm/engines
unit:
	LEVELSPAN_OUTSIDE=required $(GO) test -count=1 -timeout 20m $$($(GO) list ./... | grep -v -x -e levelspan/game/display -e levelspan/wasm -e levelspan/wasm/engines)
	LEVELSPAN_OUTSIDE=required $(GO) test -count=1 -p 1 -timeout 40m $(OUTSIDE)

# The computation and the wire formats once more as WebAssembly, the instruction set that they run on in the page.
node:
	@if command -v node >/dev/null 2>&1; then \
	  GOOS=js GOARCH=wasm $(GO) test -short -exec "$$($(GO) env GOROOT)/lib/wasm/go_js_wasm_exec" ./perf/...; \
	else echo "node is not there: the WebAssembly run of the computation is left out"; fi

bench:
	$(GO) test -run '^$$' -bench . -benchmem ./perf/... ./game/scene/... ./game/ui/... ./game/app/...
	@if command -v node >/dev/null 2>&1; then \
	  GOOS=js GOARCH=wasm $(GO) test -run '^$$' -bench . -exec "$$($(GO) env GOROOT)/lib/wasm/go_js_wasm_exec" ./perf; \
	fi
	$(GO) test -run '^$$' -bench . -benchmem ./wasm
	$(GO) test -count=1 -run TestMeasure -v ./wasm -measure

desktop:
	@.ci/deps desktop
	$(BUILD) -ldflags="$(LINK)" -o dist/desktop/ ./cmd/levelspan ./cmd/levelspan-window
	CGO_ENABLED=0 GOOS=windows GOARCH=amd64 $(BUILD) -ldflags="$(LINK) -H=windowsgui" -o dist/desktop/ ./cmd/levelspan-window
	CGO_ENABLED=0 GOOS=windows GOARCH=amd64 $(BUILD) -ldflags="$(LINK)" -o dist/desktop/ ./cmd/levelspan
	@ls -l dist/desktop

# Pictures of every screen, drawn without a display, and of the page in a real browser.
shots: deps
	mkdir -p shots
	$(GO) test ./game/app -run TestShots -count=1 -shots "$(CURDIR)/shots"
	LEVELSPAN_OUTSIDE=required $(GO) test ./wasm -run TestShots -count=1 -shots "$(CURDIR)/shots"
	LEVELSPAN_OUTSIDE=required $(GO) test ./wasm/engines -count=1 -shots "$(CURDIR)/shots"

fuzz:
	@for p in $$($(GO) list ./perf/... ./game/... ./wasm); do \
	  for f in $$($(GO) test -list '^Fuzz' $$p | grep '^Fuzz'); do \
	    echo "$$p $$f"; $(GO) test $$p -run '^$$' -fuzz "^$$f\$$" -fuzztime $(FUZZTIME) || exit 1; \
	  done; done

clean:
	rm -rf dist shots bin
