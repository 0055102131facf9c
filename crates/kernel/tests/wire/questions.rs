//! Questions about code and about the kernel; what can't be understood.

use serde_json::{Value, json};

use crate::client::Client;

#[test]
fn the_kernel_says_what_it_is_on_both_channels() {
    let client = Client::start_on_network();
    for peer in [&client.shell, &client.control] {
        let info = peer.ask("kernel_info_request", json!({}));
        assert_eq!(info["status"], "ok");
        assert_eq!(info["protocol_version"], "5.5");
        assert_eq!(info["implementation"], "tussock");
        for field in ["implementation_version", "banner"] {
            assert!(info[field].is_string(), "{field}");
        }
        for field in ["help_links", "supported_features"] {
            assert!(info[field].is_array(), "{field}");
        }
        let language = &info["language_info"];
        assert_eq!(language["name"], "tussock");
        assert_eq!(language["mimetype"], "text/x-tussock");
        assert_eq!(language["file_extension"], ".tus");
        for field in ["version", "pygments_lexer", "codemirror_mode", "nbconvert_exporter"] {
            assert!(language[field].is_string(), "{field}");
        }
    }
}

#[test]
fn every_request_stands_between_busy_and_idle() {
    let client = Client::start();
    let code = json!({"code": "a", "cursor_pos": 1});
    let shell: [(&str, Value); 9] = [
        ("comm_info_request", json!({})),
        ("complete_request", code.clone()),
        ("connect_request", json!({})),
        ("execute_request", json!({"code": "wrong a"})),
        ("history_request", json!({"hist_access_type": "tail", "n": 1})),
        ("inspect_request", code),
        ("is_complete_request", json!({"code": "a"})),
        ("kernel_info_request", json!({})),
        ("no_such_request", json!({})),
    ];
    let control: [(&str, Value); 4] = [
        ("connect_request", json!({})),
        ("interrupt_request", json!({})),
        ("kernel_info_request", json!({})),
        ("no_such_request", json!({})),
    ];
    for (peer, requests) in
        [(&client.shell, shell.as_slice()), (&client.control, control.as_slice())]
    {
        for (kind, content) in requests {
            let id = peer.send(kind, content.clone());
            client.published(&id);
            let reply = peer.reply(&id);
            assert_eq!(reply.kind, kind.replace("_request", "_reply"));
            assert_eq!(reply.header["version"], "5.5");
            assert_eq!(reply.parent["msg_type"], *kind);
        }
    }
}

#[test]
fn completion_counts_code_points() {
    let client = Client::start();
    // The last word begins after four code points, which are eight bytes and five UTF-16 units.
    let reply = client.shell.ask("complete_request", json!({"code": "é🌾x é🌾", "cursor_pos": 6}));
    assert_eq!(reply["matches"], json!(["é🌾é🌾"]));
    assert_eq!(reply["cursor_start"], 4);
    assert_eq!(reply["cursor_end"], 6);
    assert_eq!(reply["status"], "ok");
    let types = &reply["metadata"]["_jupyter_types_experimental"];
    assert_eq!(types[0]["text"], "é🌾é🌾");
    assert_eq!(types[0]["type"], "word");
    // A position beyond the text is its end.
    let reply = client.shell.ask("complete_request", json!({"code": "é🌾", "cursor_pos": 99}));
    assert_eq!(reply["cursor_end"], 2);
}

#[test]
fn a_word_is_explained_in_three_forms() {
    let client = Client::start();
    let reply = client
        .shell
        .ask("inspect_request", json!({"code": "🌾 é", "cursor_pos": 2, "detail_level": 0}));
    assert_eq!(reply["found"], true);
    assert_eq!(reply["metadata"], json!({}));
    let data = reply["data"].as_object().unwrap();
    assert!(data["text/plain"].as_str().unwrap().starts_with("**é**"));
    assert!(data["text/markdown"].as_str().unwrap().starts_with("**é**"));
    let html = data["text/html"].as_str().unwrap();
    assert!(html.contains("<strong>é</strong>") && html.contains("<td>1</td>"), "{html}");
    let reply = client.shell.ask("inspect_request", json!({"code": "é", "cursor_pos": 1}));
    assert_eq!(reply, json!({"status": "ok", "found": false, "data": {}, "metadata": {}}));
}

#[test]
fn a_console_is_told_whether_code_is_whole() {
    let client = Client::start();
    let ask = |code: &str| client.shell.ask("is_complete_request", json!({"code": code}));
    assert_eq!(ask("all")["status"], "complete");
    assert_eq!(ask("more"), json!({"status": "incomplete", "indent": "  "}));
    assert_eq!(ask("never")["status"], "invalid");
}

#[test]
fn history_is_kept_with_what_was_shown() {
    let client = Client::start();
    for code in ["note a", "table b", "note a"] {
        client.run(code);
    }
    let ask = |content: Value| client.shell.ask("history_request", content)["history"].clone();
    assert_eq!(
        ask(json!({"hist_access_type": "range", "session": 0, "start": 1, "stop": 3,
                   "output": false, "raw": true})),
        json!([[1, 1, "note a"], [1, 2, "table b"]])
    );
    assert_eq!(
        ask(json!({"hist_access_type": "search", "pattern": "note*", "n": 5, "unique": true})),
        json!([[1, 3, "note a"]])
    );
    let with_output = ask(json!({"hist_access_type": "tail", "n": 2, "output": true}));
    assert_eq!(with_output[0][2][0], "table b");
    assert!(with_output[0][2][1].as_str().unwrap().contains("A table"));
    assert_eq!(with_output[1], json!([1, 3, ["note a", null]]));
}

#[test]
fn no_widget_is_known_and_one_that_is_opened_is_closed() {
    let client = Client::start();
    let info = client.shell.ask("comm_info_request", json!({"target_name": "any"}));
    assert_eq!(info, json!({"status": "ok", "comms": {}}));
    let open = json!({"comm_id": "w1", "target_name": "any", "data": {}});
    let id = client.shell.send("comm_open", open);
    let published = client.published(&id);
    assert_eq!(published.len(), 1);
    assert_eq!(published[0].kind, "comm_close");
    assert_eq!(published[0].content, json!({"comm_id": "w1", "data": {}}));
    for kind in ["comm_msg", "comm_close"] {
        let id = client.shell.send(kind, json!({"comm_id": "w1", "data": {}}));
        assert!(client.published(&id).is_empty());
    }
    assert!(client.shell.is_silent_for(50));
}

#[test]
fn the_kernel_says_where_it_listens() {
    let client = Client::start();
    let reply = client.shell.ask("connect_request", json!({}));
    let ports = ["shell_port", "iopub_port", "stdin_port", "control_port", "hb_port"];
    assert_eq!(ports.map(|port| reply[port].as_u64().unwrap()), [1, 2, 3, 4, 5]);
}

#[test]
fn a_request_that_can_not_be_read_or_is_unknown_gets_an_error_reply() {
    let client = Client::start();
    for (kind, content, name) in [
        ("execute_request", json!({"kode": "x"}), "bad-request"),
        ("complete_request", json!({"code": "x", "cursor_pos": -1}), "bad-request"),
        ("history_request", json!({"hist_access_type": "sideways"}), "bad-request"),
        ("debug_request", json!({}), "unknown-request"),
    ] {
        let reply = client.shell.ask(kind, content);
        assert_eq!(reply["status"], "error", "{kind}");
        assert_eq!(reply["ename"], name, "{kind}");
        assert!(reply["evalue"].is_string() && reply["traceback"].is_array(), "{kind}");
    }
    assert_eq!(client.run("note on").1["status"], "ok");
}
