//! `shutdown_request`: the end, or the end before a new beginning, which the client brings about.

use serde::Deserialize;
use serde_json::json;

use super::{Answer, Control, Exchange, Handled};

#[derive(Deserialize)]
struct Asked {
    #[serde(default)]
    restart: bool,
}

pub(crate) fn answer(control: &mut Control, exchange: &Exchange<'_>) -> Handled {
    let asked: Asked = exchange.request.content()?;
    control.ending = true;
    let answer = Answer::ok(json!({ "restart": asked.restart }));
    // Every client hears of the end, not only the one that asked for it.
    if let Some(content) = &answer.content {
        exchange.publish("shutdown_reply", content.clone());
    }
    Ok(answer)
}
