;;; layshaft-test.el --- Opens a spec in Emacs as a user would -*- lexical-binding: t; coding: utf-8 -*-

;; usage: emacs -Q --batch -l layshaft-test.el SPEC
;; Looks at colours, indentation and index, then at what Eglot gets from the server that `layshaft' on the path starts.

;;; Code:

;; `emacs -Q' does not look where a distribution keeps its packages.
(let ((packages "/usr/share/emacs/site-lisp/elpa"))
  (when (file-directory-p packages)
    (dolist (folder (directory-files packages t "^[a-z]"))
      (add-to-list 'load-path folder))))
(add-to-list 'load-path (file-name-directory load-file-name))
(require 'eglot)
(require 'flymake)
(require 'imenu)
(require 'layshaft-mode)

(defvar test-failed 0)

(defun test-check (name ok &optional seen)
  "Print whether NAME is OK, with what was SEEN."
  (let ((seen (and seen (replace-regexp-in-string "\n" " " (format "%s" seen)))))
    (princ (format "%s %s%s\n" (if ok "ok  " "FAIL") name
                   (if seen (concat ": " (truncate-string-to-width seen 160)) ""))))
  (unless ok (setq test-failed (1+ test-failed))))

(defun test-wait (predicate)
  "Wait until PREDICATE holds, at most 20 seconds."
  (let ((end (+ (float-time) 20)))
    (while (and (not (funcall predicate)) (< (float-time) end))
      (accept-process-output nil 0.02)))
  (funcall predicate))

(defun test-edited ()
  "Tell the server what was typed: Emacs does so when it is idle, which it never is here."
  (eglot--signal-textDocument/didChange))

(defun test-face (text line)
  "The face of TEXT in LINE, a text in a spec of its own."
  (with-temp-buffer
    (layshaft-mode)
    (insert line)
    (font-lock-ensure)
    (goto-char (point-min))
    (search-forward text)
    (get-text-property (match-beginning 0) 'face)))

(defun test-colours ()
  "Words at their place are coloured, and not elsewhere."
  (pcase-dolist (`(,text ,line ,face)
                 '(("source" "source motor: dc_motor {" font-lock-keyword-face)
                   ("motor" "source motor: dc_motor {" font-lock-variable-name-face)
                   ("dc_motor" "source motor: dc_motor {" font-lock-type-face)
                   ("dc_moto" "source motor: dc_moto {" nil)
                   ("force" "let pull: force = 3 N" font-lock-type-face)
                   ("N·m" "    torque = 1.4 N·m  from \"plate\"" font-lock-type-face)
                   ("kgg" "    mass = 60 kgg" nil)
                   ("W/(m" "    heat = 18 W/(m²·K)" font-lock-type-face)
                   ("from" "    torque = 1.4 N·m  from \"plate\"" font-lock-keyword-face)
                   ("load" "    load = 5 N" font-lock-variable-name-face)
                   ("only" "require \"x\" a > 1  only in b" font-lock-keyword-face)
                   ("in" "require \"x\" a > 1  only in b" font-lock-keyword-face)
                   ("and" "require \"x\" a and b" font-lock-keyword-face)
                   ("yes" "    on = yes" font-lock-constant-face)
                   ("max" "let a = max(b, c)" font-lock-builtin-face)
                   ("A" "show motor.current as A" font-lock-type-face)
                   ("plate" "title \"plate # 3\"" font-lock-string-face)
                   ("by hand" "let a = 1 # by hand" font-lock-comment-face)
                   ("The fan" "## The fan" font-lock-doc-face)))
    (let ((found (test-face text line)))
      (test-check (format "colour of `%s' in `%s'" text line) (eq found face) found))))

(defun test-indentation (spec)
  "A spec in its one form stays as it is when every line is indented anew."
  (with-temp-buffer
    (insert-file-contents spec)
    (let ((good (buffer-string)))
      (layshaft-mode)
      (goto-char (point-min))
      (while (not (eobp))
        ;; Columns of a table are set by hand.
        (unless (looking-at "[ \t]*\\(-?[0-9]\\|#\\|$\\)") (indent-line-to 0))
        (forward-line 1))
      (let ((inhibit-message t)) (indent-region (point-min) (point-max)))
      (test-check "indentation is that of the formatter" (equal good (buffer-string))
                  (unless (equal good (buffer-string)) (buffer-string))))))

(defun test-server (spec)
  "What Eglot gets for SPEC."
  (setq eglot-sync-connect 20 eglot-autoshutdown t make-backup-files nil create-lockfiles nil)
  (find-file spec)
  (test-check "mode" (eq major-mode 'layshaft-mode) major-mode)
  (test-check "index" (assoc "lift" (cdr (assoc "Drives" (funcall imenu-create-index-function)))))
  (let ((inhibit-message t)) (call-interactively #'eglot))
  (test-check "server" (eglot-managed-p) (plist-get (eglot--server-info (eglot-current-server)) :name))
  (flymake-mode 1)
  (flymake-start)
  (test-hover)
  (test-findings)
  (test-definition)
  (test-completion)
  (test-rename)
  (test-format)
  (set-buffer-modified-p nil)
  (let ((server (eglot-current-server)))
    (eglot-shutdown server nil 5)
    (test-check "server ends" (test-wait (lambda () (not (jsonrpc-running-p server)))))))

(defun test-at (text)
  "Put point on TEXT."
  (goto-char (point-min))
  (search-forward text)
  (goto-char (match-beginning 0)))

(defun test-hover ()
  "The hover on a drive holds its numbers."
  (test-at "lift = motor")
  (let (doc)
    (eglot-hover-eldoc-function (lambda (text &rest _) (setq doc text)))
    (test-wait (lambda () doc))
    (test-check "hover has the numbers" (and doc (string-match-p "1447 rpm" doc)) doc)))

(defun test-findings ()
  "A unit is broken, told once, and mended."
  (test-check "no findings in a good spec" (null (flymake-diagnostics)) (flymake-diagnostics))
  (test-at "60 kg")
  (search-forward "kg")
  (insert "g")
  (test-edited)
  (test-wait #'flymake-diagnostics)
  (let ((found (flymake-diagnostics)))
    (test-check "a broken unit is told" found (and found (flymake-diagnostic-text (car found))))
    (test-check "one mistake, one message" (= (length found) 1) (length found)))
  (delete-char -1)
  (test-edited)
  (test-check "gone when mended" (test-wait (lambda () (null (flymake-diagnostics))))))

(defun test-definition ()
  "The definition of a value is where it is declared."
  (test-at "block_mass;")
  (let ((found (xref-backend-definitions 'eglot (xref-backend-identifier-at-point 'eglot))))
    (test-check "definition" (and found (string-match-p "let block_mass" (xref-item-summary (car found))))
                (and found (xref-item-summary (car found))))))

(defun test-completion ()
  "A field that a part has not yet is offered."
  (test-at "    poles = 4")
  (insert "    max_s")
  (test-edited)
  (let* ((table (eglot-completion-at-point))
         (offered (and table (all-completions "max_s" (nth 2 table)))))
    (test-check "completion" (seq-some (lambda (text) (string-match-p "max_speed" text)) offered) offered))
  (delete-region (line-beginning-position) (point))
  (test-edited))

(defun test-rename ()
  "A rename reaches every place."
  (test-at "block_mass")
  (eglot-rename "block_weight")
  (goto-char (point-min))
  (test-check "rename" (= (how-many "block_weight") 5) (how-many "block_weight")))

(defun test-format ()
  "A messy line is brought into form."
  (test-at "let block_weight = 60 kg")
  (search-forward " = ")
  (replace-match "=" t t)
  (test-edited)
  (eglot-format-buffer)
  (goto-char (point-min))
  (test-check "format" (search-forward "let block_weight = 60 kg" nil t)))

(setq-default case-fold-search nil)
(let ((spec (expand-file-name (pop command-line-args-left))))
  (test-colours)
  (test-indentation spec)
  (condition-case problem
      (test-server spec)
    (error (test-check "no error" nil problem)))
  (princ (format "%d failed\n" test-failed))
  (kill-emacs (if (= test-failed 0) 0 1)))

;;; layshaft-test.el ends here
