"""The worker and its client: states, answers, newest wins, and a worker that dies."""
from __future__ import annotations

import gasbasis
import pytest

pytestmark = pytest.mark.native

DIES_SOON = """() => { setTimeout(() => {
    const until = Date.now() + 800;
    while (Date.now() < until);                              // busy, so that questions wait in its queue
    self.postMessage({ type: "failed", message: "simulated" });
    self.close();
  }, 0); }"""


def test_start_reports_progress_and_version(core_page):
    page = core_page()
    states = page.evaluate("states")
    assert [state["phase"] for state in states][-1] == "ready"
    assert {"loading", "importing", "ready"} <= {state["stage"] for state in states}
    loading = [state for state in states if state["stage"] == "loading"]
    assert loading[-1]["done"] == loading[-1]["of"] > 9_000_000          # the engine's bytes were counted to the last
    assert page.evaluate("core.state.version") == gasbasis.__version__


def test_answer_in_the_page_is_that_of_the_terminal(core_page):
    import json
    from gasbasis.answer import answer
    request = {"task": "search", "what": "species", "text": "merc"}
    assert core_page().evaluate("(request) => core.ask(request)", request) == json.loads(answer(json.dumps(request)))["answer"]


def test_an_error_of_the_core_rejects_with_its_fields(core_page):
    problem = core_page().evaluate("core.ask({task: 'no such task'}).catch((error) => error.problem)")
    assert problem["kind"] == "not_understood" and problem["field"] == "task" and problem["message"] and problem["hint"]


def test_newest_wins_in_a_channel_and_others_are_answered(core_page):
    outcomes = core_page().evaluate("""() => {
        const ask = (channel) => core.ask({ task: "version" }, { channel }).then((answer) => answer.version, (error) => error.problem.kind);
        return Promise.all([ask("typing"), ask("typing"), ask("typing"), ask("typing"), ask("other"), ask()]);
      }""")
    assert outcomes == ["superseded", "superseded", "superseded"] + [gasbasis.__version__] * 3


def test_questions_asked_before_python_is_up_are_answered(bare):
    version = bare().evaluate("client.createCore().ask({ task: 'version' }).then((answer) => answer.version)")
    assert version == gasbasis.__version__


def test_a_dead_worker_is_replaced_and_the_question_asked_again(core_page):
    page = core_page()
    page.workers[0].evaluate(DIES_SOON)
    version = page.evaluate("core.ask({ task: 'version' }, { channel: 'typing' }).then((answer) => answer.version)")
    assert version == gasbasis.__version__
    assert [state["phase"] for state in page.evaluate("states")].count("ready") == 2
    assert page.evaluate("core.state.phase") == "ready" and len(page.workers) == 1


FAKE = "self.onmessage = ({ data }) => { if (data.type === 'start') self.postMessage({ type: 'ready', version: 'fake' }); %s };"
KILLS = "else self.postMessage({ type: 'failed', message: 'simulated' });"
ASK = "core.ask({ task: 'version' }).then((answer) => answer, (error) => error.problem)"


@pytest.fixture
def with_fake(bare):
    """A function that opens a bare document whose worker is a fake: ready at once, then as told."""
    def make(behaviour: str):
        page = bare()
        page.started = []
        page.on("worker", lambda worker: page.started.append(worker))
        page.route("**/js/core-worker.js", lambda route: route.fulfill(content_type="text/javascript", body=FAKE % behaviour))
        return page
    return make


def test_a_question_that_kills_python_twice_is_given_up(with_fake):
    page = with_fake(KILLS)
    page.evaluate("() => { window.core = client.createCore(); }")
    problem = page.evaluate(ASK)
    assert problem["kind"] == "unavailable" and problem["message"] == "simulated"
    page.wait_for_timeout(300)
    assert len(page.started) == 3
    assert page.evaluate("core.state.phase") != "failed"                  # other questions may still be answered


def test_a_core_that_only_dies_is_given_up_and_can_be_started_by_hand(with_fake):
    page = with_fake(KILLS)
    page.evaluate("() => { window.core = client.createCore(); }")
    for _ in range(2):
        page.evaluate(ASK)
    assert page.evaluate("core.state.phase") == "failed"
    page.unroute("**/js/core-worker.js")
    page.evaluate("core.restart()")
    assert page.evaluate(ASK)["version"] == gasbasis.__version__


def test_an_answer_that_takes_too_long_is_stopped(with_fake):
    page = with_fake("")
    page.clock.install()
    page.evaluate("() => { window.core = client.createCore(); }")
    page.wait_for_event("worker")
    page.evaluate("() => { window.outcome = " + ASK + "; }")
    page.wait_for_timeout(300)
    page.clock.fast_forward(61_000)
    assert page.evaluate("outcome")["kind"] == "too_long"


def test_without_webassembly_it_says_so(bare):
    page = bare()
    page.evaluate("() => { delete globalThis.WebAssembly; window.core = client.createCore(); }")
    assert page.evaluate("core.state.phase") == "failed"
    assert "WebAssembly" in page.evaluate("core.state.message")
    problem = page.evaluate("core.ask({ task: 'version' }).catch((error) => error.problem)")
    assert problem["kind"] == "unavailable" and "WebAssembly" in problem["message"]


def test_a_missing_file_is_a_message_and_not_an_endless_wait(bare):
    page = bare(quiet=False)
    page.route("**/runtime/gasbasis-*.whl", lambda route: route.fulfill(status=404, body="gone"))
    message = page.evaluate("""() => new Promise((resolve) => client.createCore({ onState: (state) => {
        if (state.phase === "failed") resolve(state.message); } }))""")
    assert "gasbasis" in message and "404" in message


def test_silence_at_the_start_is_given_up(bare):
    page = bare(quiet=False)
    page.clock.install()
    page.route("**/runtime/**", lambda route: None)                      # asked and never answered
    page.evaluate("() => { window.core = client.createCore(); }")
    page.clock.fast_forward(29_000)
    assert page.evaluate("core.state.phase") == "loading"
    page.clock.fast_forward(2_000)
    assert page.evaluate("core.state.phase") == "failed"
    assert "30 seconds" in page.evaluate("core.state.message")
