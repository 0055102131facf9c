//! Signatures, the heartbeat, what is answered while a cell runs, and the end.

use std::time::Instant;

use serde_json::json;

use crate::client::Client;

fn beat(client: &Client) {
    client.heartbeat.send(&b"beat"[..], 0).unwrap();
    assert_eq!(client.heartbeat.recv_bytes(0).unwrap(), b"beat");
}

#[test]
fn the_heart_beats_and_control_answers_while_a_cell_runs() {
    let client = Client::start_on_network();
    beat(&client);
    let id = client.execute("stay");
    client.wait_until_busy(&id);
    beat(&client);
    beat(&client);
    assert_eq!(client.control.ask("kernel_info_request", json!({}))["status"], "ok");
    assert!(client.shell.is_silent_for(50));
    client.control.ask("interrupt_request", json!({}));
    client.shell.reply(&id);
}

#[test]
fn a_request_with_a_wrong_signature_is_not_answered() {
    let client = Client::start();
    let content = json!({"code": "note forged"});
    for peer in [&client.shell, &client.control] {
        peer.send_signed("execute_request", content.clone(), json!({}), "another key");
        peer.send_signed("shutdown_request", json!({}), json!({}), "another key");
        assert!(peer.is_silent_for(150));
    }
    assert!(client.iopub.is_silent_for(50));
    let (published, _) = client.run("count");
    assert_eq!(published[1].plain(), "1");
}

#[test]
fn each_subscriber_is_welcomed_with_its_topic() {
    let client = Client::start();
    let all = client.subscriber("");
    assert_eq!(all.receive().content, json!({"subscription": ""}));
    let statuses = client.subscriber("status");
    assert_eq!(statuses.receive().content, json!({"subscription": "status"}));
    client.run("note a");
    assert!(statuses.receive().is_status("busy"));
    assert!(statuses.receive().is_status("idle"));
}

#[test]
fn the_end_is_announced_to_the_client_that_asked_and_to_all() {
    for restart in [false, true] {
        let mut client = Client::start_on_network();
        client.run("note a");
        let reply = client.shut_down(restart);
        assert_eq!(reply, json!({"status": "ok", "restart": restart}));
        let published = [(); 3].map(|()| client.iopub.receive());
        assert!(published[0].is_status("busy"));
        assert_eq!(published[1].kind, "shutdown_reply");
        assert_eq!(published[1].content, reply);
        assert!(published[2].is_status("idle"));
    }
}

#[test]
fn a_new_kernel_can_begin_where_the_old_one_ended() {
    let mut client = Client::start_on_network();
    client.run("note a");
    let connection = client.connection.clone();
    client.shut_down(true);
    drop(client);
    let again = Client::start_with(connection);
    let (published, reply) = again.run("count");
    assert_eq!(published[1].plain(), "1");
    assert_eq!(reply["execution_count"], 1);
}

#[test]
fn the_end_does_not_wait_for_a_cell_that_runs() {
    for code in ["stay", "stubborn"] {
        let mut client = Client::start_on_network();
        let id = client.execute(code);
        client.wait_until_busy(&id);
        let waiting = client.execute("stubborn");
        let started = Instant::now();
        assert_eq!(client.shut_down(false)["status"], "ok");
        assert!(started.elapsed().as_secs() < 8, "{code}");
        drop(waiting);
    }
}

#[test]
fn an_address_that_is_taken_is_an_error_with_the_address() {
    let client = Client::start_on_network();
    let error = tussock_kernel::serve(&client.connection, crate::scripted::Scripted::default())
        .unwrap_err()
        .to_string();
    assert!(error.contains("can't listen on tcp://127.0.0.1:"), "{error}");
}
