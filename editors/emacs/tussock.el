;;; tussock.el --- Compare groups on several outcomes at once  -*- lexical-binding: t; -*-

;; Version: 0.1.0
;; Package-Requires: ((emacs "28.1"))
;; Keywords: languages

;;; Commentary:

;; A major mode for Tussock scripts, and the language server for it by way of eglot.

;;; Code:

(defvar eglot-server-programs)

(defgroup tussock nil
  "Compare groups on several outcomes at once."
  :group 'languages)

(defcustom tussock-program "tussock"
  "The tussock program."
  :type 'string)

(defconst tussock-verbs
  '("policy" "read" "admit" "derive" "levels" "label" "compare" "show" "write" "pin")
  "Words that a statement starts with.")

(defconst tussock-words
  '("alpha" "interval" "pairs" "scores" "effect" "missing" "sample" "as" "separator" "decimal" "encoding" "where" "because" "merging" "into" "unit" "better" "across" "in" "of" "for" "coefficients" "at" "within")
  "Words of clauses.")

(defconst tussock-operators
  '("and" "or" "not" "if" "then" "else")
  "Words of expressions.")

(defvar tussock-font-lock-keywords
  `((,(concat "^" (regexp-opt tussock-verbs 'symbols)) . font-lock-keyword-face)
    (,(regexp-opt tussock-words 'symbols) . font-lock-builtin-face)
    (,(regexp-opt tussock-operators 'symbols) . font-lock-builtin-face)
    ("`[^`\n]*`" . font-lock-variable-name-face)
    ("{{[^}\n]*}}" 0 font-lock-constant-face prepend))
  "What is coloured, beside texts and comments.")

(defvar tussock-mode-syntax-table
  (let ((table (make-syntax-table)))
    (modify-syntax-entry ?# "<" table)
    (modify-syntax-entry ?\n ">" table)
    (modify-syntax-entry ?\" "\"" table)
    (modify-syntax-entry ?_ "_" table)
    ;; A backslash is a sign like any other.
    (modify-syntax-entry ?\\ "." table)
    table)
  "Comments run from `#' to the end of the line, texts stand in double quotes.")

;;;###autoload
(define-derived-mode tussock-mode prog-mode "Tussock"
  "Major mode for Tussock scripts."
  (setq-local comment-start "# ")
  (setq-local comment-end "")
  (setq-local font-lock-defaults '(tussock-font-lock-keywords)))

;;;###autoload
(add-to-list 'auto-mode-alist '("\\.tus\\'" . tussock-mode))

(with-eval-after-load 'eglot
  (add-to-list 'eglot-server-programs
               `(tussock-mode . ,(lambda (&rest _) (list tussock-program "server")))))

(provide 'tussock)
;;; tussock.el ends here
