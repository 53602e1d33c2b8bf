"use client";

import { Fragment } from "react";
import { useFormState } from "react-hook-form";
import { Note } from "../note";
import { flattenErrors } from "./field-errors";
import { fieldId, useFormInfo } from "./form-context";

/** After a try: how many things to fix, each a link to its field. Nothing before the first try. */
export function ErrorSummary({ labels, toFix = "before this is saved" }: { labels: ReadonlyMap<string, string>; toFix?: string }) {
  const { errors, submitCount } = useFormState();
  const { formId } = useFormInfo();
  const list = flattenErrors(errors);
  if (submitCount === 0 || list.length === 0) return null;
  return (
    <Note live tone="stop" title={`${list.length === 1 ? "1 thing" : `${list.length} things`} to fix ${toFix}.`}>
      {list.map((e, i) => {
        const id = fieldId(formId, e.path);
        const text = labels.get(e.path);
        return (
          <Fragment key={e.path}>
            {i === 0 ? null : ", "}
            {text === undefined ? (
              e.message
            ) : (
              <a
                className="lk"
                href={`#${id}`}
                onClick={(event) => {
                  event.preventDefault();
                  document.getElementById(id)?.focus();
                }}
              >
                {text}
              </a>
            )}
          </Fragment>
        );
      })}
    </Note>
  );
}
