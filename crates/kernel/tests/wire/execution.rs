//! Running cells: what is published in which order, counting, errors, stopping.

use serde_json::json;

use crate::client::{Client, Received};

fn kinds(messages: &[Received]) -> Vec<&str> {
    messages.iter().map(|message| message.kind.as_str()).collect()
}

#[test]
fn a_cell_publishes_its_input_and_its_outputs_in_reading_order() {
    let client = Client::start();
    let (published, reply) = client.run("note one\ntable two\ndoubtful three\ntable four");
    assert_eq!(
        kinds(&published),
        ["execute_input", "display_data", "display_data", "display_data", "execute_result"]
    );
    let code = "note one\ntable two\ndoubtful three\ntable four";
    assert_eq!(published[0].content, json!({"code": code, "execution_count": 1}));
    for (message, word) in published[1..].iter().zip(["one", "two", "three", "four"]) {
        assert!(message.plain().contains(word), "{message:#?}");
        assert!(message.content["data"]["text/html"].as_str().unwrap().contains(word));
        assert!(message.content["metadata"].is_object());
    }
    assert_eq!(published[4].content["execution_count"], 1);
    assert!(published[4].content["data"]["text/markdown"].as_str().unwrap().contains("four"));
    assert_eq!(
        reply,
        json!({"status": "ok", "payload": [], "user_expressions": {}, "execution_count": 1})
    );
}

#[test]
fn a_table_that_is_not_the_last_output_is_not_the_result() {
    let client = Client::start();
    let (published, _) = client.run("table one\nnote two");
    assert_eq!(kinds(&published), ["execute_input", "display_data", "display_data"]);
}

#[test]
fn a_warning_after_the_last_table_leaves_it_the_result() {
    let client = Client::start();
    let (published, _) = client.run("table one\ndoubtful two");
    assert_eq!(kinds(&published), ["execute_input", "execute_result", "display_data"]);
    let callout = &published[2].content["data"];
    let html = callout["text/html"].as_str().unwrap();
    assert!(html.contains("two is &lt;doubtful&gt;") && html.contains("made-up-doubt"), "{html}");
    assert!(html.contains("cell [1], line 2"), "{html}");
    assert!(published[2].plain().contains("2 | doubtful two"), "{}", published[2].plain());
}

#[test]
fn the_count_begins_at_one_and_passes_over_what_is_not_stored() {
    let client = Client::start();
    let count = |content: serde_json::Value| {
        client.shell.ask("execute_request", content)["execution_count"].clone()
    };
    assert_eq!(count(json!({"code": "note a"})), 1);
    assert_eq!(count(json!({"code": "note b", "store_history": false})), 1);
    assert_eq!(count(json!({"code": "note c", "silent": true})), 1);
    assert_eq!(count(json!({"code": "note d", "silent": true, "store_history": true})), 1);
    assert_eq!(count(json!({"code": "wrong e"})), 2);
    assert_eq!(count(json!({"code": "note f"})), 3);
    let history = client.shell.ask("history_request", json!({"hist_access_type": "tail"}));
    assert_eq!(history["history"], json!([[1, 1, "note a"], [1, 2, "wrong e"], [1, 3, "note f"]]));
}

#[test]
fn a_silent_cell_runs_and_publishes_nothing() {
    let client = Client::start();
    let id = client.shell.send("execute_request", json!({"code": "table x", "silent": true}));
    assert!(client.published(&id).is_empty());
    assert_eq!(client.shell.reply(&id).content["status"], "ok");
    let (published, _) = client.run("count");
    assert_eq!(published[1].plain(), "2");
}

#[test]
fn the_front_ends_name_of_a_cell_reaches_the_evaluator() {
    let client = Client::start();
    let metadata = json!({"cellId": "c-7", "deletedCells": []});
    let content = json!({"code": "cell"});
    let id = client.shell.send_signed("execute_request", content, metadata, "a6f1c0de-key");
    assert_eq!(client.published(&id)[1].plain(), "c-7");
    client.shell.reply(&id);
    assert_eq!(client.run("cell").0[1].plain(), "unnamed");
}

#[test]
fn all_errors_of_a_cell_come_last_in_one_message() {
    let client = Client::start();
    let (published, reply) = client.run("note é\nwrong first\ntable two\n  wrong second");
    assert_eq!(kinds(&published), ["execute_input", "display_data", "display_data", "error"]);
    let error = &published[3].content;
    assert_eq!(error["ename"], "made-up");
    assert_eq!(error["evalue"], "first is wrong");
    let traceback = error["traceback"].as_array().unwrap();
    assert_eq!(traceback.len(), 2);
    let first = traceback[0].as_str().unwrap();
    assert!(
        first.contains("cell [1], line 2\n  2 | wrong first\n    | \u{1b}[31m^^^^^^^^^^^\u{1b}[0m"),
        "{first}"
    );
    assert!(first.contains("help: mend it"), "{first}");
    assert!(traceback[1].as_str().unwrap().contains("line 4"));
    assert_eq!(reply["status"], "error");
    assert_eq!(reply["execution_count"], 1);
    for field in ["ename", "evalue", "traceback"] {
        assert_eq!(reply[field], error[field]);
    }
}

#[test]
fn an_error_stops_the_cells_that_wait_and_none_that_comes_later() {
    let client = Client::start();
    let busy = client.execute("stay");
    client.wait_until_busy(&busy);
    let waiting = [client.execute("note a"), client.execute("note b")];
    let info = client.shell.send("kernel_info_request", json!({}));
    // Time for all of them to arrive.
    assert!(client.shell.is_silent_for(100));
    client.control.ask("interrupt_request", json!({}));
    assert_eq!(client.shell.reply(&busy).content["ename"], "interrupted");
    for id in &waiting {
        let reply = client.shell.reply(id);
        assert_eq!(reply.content, json!({"status": "aborted", "execution_count": 1}));
    }
    // Only cells are stopped.
    assert_eq!(client.shell.reply(&info).content["status"], "ok");
    let (published, reply) = client.run("count");
    assert_eq!(published[1].plain(), "2");
    assert_eq!(reply["execution_count"], 2);
}

#[test]
fn cells_go_on_after_an_error_where_the_client_wishes_so() {
    let client = Client::start();
    for _ in 0..20 {
        let wrong = json!({"code": "wrong x", "stop_on_error": false});
        let ids = [
            client.shell.send("execute_request", wrong),
            client.execute("note a"),
            client.execute("note b"),
        ];
        let statuses = ids.map(|id| client.shell.reply(&id).content["status"].clone());
        assert_eq!(statuses, ["error", "ok", "ok"]);
    }
}

#[test]
fn a_cell_that_is_interrupted_stops_and_the_session_goes_on() {
    let client = Client::start();
    client.run("note before");
    let id = client.execute("note kept\nstay");
    client.wait_until_busy(&id);
    let started = std::time::Instant::now();
    assert_eq!(client.control.ask("interrupt_request", json!({})), json!({"status": "ok"}));
    let reply = client.shell.reply(&id).content;
    assert!(started.elapsed().as_secs() < 5);
    assert_eq!(reply["status"], "error");
    assert_eq!(reply["ename"], "interrupted");
    let (published, reply) = client.run("count");
    assert_eq!(published[1].plain(), "3");
    assert_eq!(reply["status"], "ok");
}

#[test]
fn what_a_cell_gave_before_it_was_interrupted_is_shown() {
    let client = Client::start();
    let id = client.execute("note kept\nstay");
    loop {
        let message = client.iopub.receive();
        if message.follows(&id) && message.kind == "execute_input" {
            break;
        }
    }
    client.control.ask("interrupt_request", json!({}));
    let mut shown = Vec::new();
    loop {
        let message = client.iopub.receive();
        if message.follows(&id) {
            if message.is_status("idle") {
                break;
            }
            shown.push(message);
        }
    }
    assert_eq!(kinds(&shown), ["display_data", "error"]);
    assert_eq!(shown[0].plain(), "kept");
    client.shell.reply(&id);
}

#[test]
fn an_interrupt_while_nothing_runs_stops_nothing_later() {
    let client = Client::start();
    client.control.ask("interrupt_request", json!({}));
    let id = client.execute("stay");
    client.wait_until_busy(&id);
    assert!(client.shell.is_silent_for(200));
    client.control.ask("interrupt_request", json!({}));
    client.shell.reply(&id);
}

#[test]
fn a_panic_is_an_error_that_asks_for_a_report_and_the_session_goes_on() {
    let client = Client::start();
    let (published, reply) = client.run("fall a stone");
    assert_eq!(kinds(&published), ["execute_input", "error"]);
    let traceback = published[1].content["traceback"][0].as_str().unwrap();
    assert!(traceback.contains("fell over a stone") && traceback.contains("report"), "{traceback}");
    assert_eq!(reply["ename"], "internal-error");
    assert_eq!(reply["execution_count"], 1);
    let (published, _) = client.run("count");
    assert_eq!(published[1].plain(), "2");
}

#[test]
fn not_one_of_many_outputs_is_lost_and_idle_comes_after_them() {
    let client = Client::start_on_network();
    let (published, _) = client.run("many 5000");
    let shown: Vec<&str> = published[1..].iter().map(Received::plain).collect();
    let expected: Vec<String> = (0..5000).map(|n| n.to_string()).collect();
    assert_eq!(shown, expected);
}
