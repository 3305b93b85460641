;;; drive.el --- Drive eglot through a session  -*- lexical-binding: t; -*-

;; usage: SPANWRIGHT=program emacs --batch -l drive.el

;;; Code:

(require 'package)
(package-initialize)
(require 'cl-lib)
(require 'eglot)
(defvar drive-here (file-name-directory load-file-name))
(add-to-list 'load-path (expand-file-name "../../emacs" drive-here))
(require 'span-mode)
(setq span-program (getenv "SPANWRIGHT")
      eglot-sync-connect 10
      eglot-autoshutdown nil
      make-backup-files nil)

(defun say (what) (princ (format "emacs: %s\n" what)))

(defmacro wait-for (what &rest body)
  "Wait until BODY is true, else fail with WHAT."
  `(let ((deadline (+ (float-time) 20)) value)
     (while (and (not (setq value (progn ,@body))) (< (float-time) deadline))
       (accept-process-output nil 0.05))
     (unless value
       (error "Never: %s; messages: %S" ,what (messages)))
     (say ,what)
     value))

(defun messages ()
  "Return the texts of the present messages."
  (flymake-start)
  (accept-process-output nil 0.05)
  (mapcar #'flymake-diagnostic-text (flymake-diagnostics)))

(defun changed ()
  "Tell the server of edits now: a batch session has no idle time."
  (eglot--signal-textDocument/didChange))

(defun hover ()
  "Return the hover at point as text."
  (let ((answer (jsonrpc-request (eglot--current-server-or-lose) :textDocument/hover (eglot--TextDocumentPositionParams))))
    (let ((contents (plist-get answer :contents)))
      (if (stringp contents) contents (or (plist-get contents :value) "")))))

(let* ((folder (make-temp-file "spanwright" t))
       (file (expand-file-name "boathouse.span" folder)))
  (copy-file (expand-file-name "../../../testdata/models/boathouse.span" drive-here) file)
  (find-file file)
  (cl-assert (eq major-mode 'span-mode))
  (apply #'eglot--connect (eglot--guess-contact))
  (wait-for "connects" (eglot-current-server))
  (wait-for "has no messages" (not (messages)))

  (goto-char (point-min))
  (search-forward "support A")
  (backward-char)
  (let ((text (wait-for "hovers" (let ((text (hover))) (and (string-match-p "this version" text) text)))))
    (cl-assert (string-match-p "Fz" text))
    (cl-assert (not (string-match-p "data:image" text))))

  (goto-char (point-min))
  (search-forward "A -> B ")
  (replace-match "A -> Bee " t t)
  (changed)
  (wait-for "sees an error" (cl-some (lambda (text) (string-match-p "Bee" text)) (messages)))
  (goto-char (point-min))
  (search-forward "A -> Bee ")
  (replace-match "A -> B " t t)
  (changed)
  (wait-for "sees it go" (not (messages)))

  (goto-char (point-min))
  (search-forward "bar ")
  (beginning-of-line)
  (insert "beam extra = A -> \n")
  (backward-char)
  (changed)
  (let* ((capf (eglot-completion-at-point))
         (offered (all-completions "" (nth 2 capf))))
    (cl-assert (cl-subsetp '("B" "C") (mapcar #'string-trim offered) :test #'equal) nil "offered %S" offered)
    (say "completes nodes"))
  (delete-region (line-beginning-position) (1+ (line-end-position)))
  (changed)

  (goto-char (point-min))
  (search-forward "node C")
  (backward-char)
  (eglot-rename "apex")
  (changed)
  (goto-char (point-min))
  (cl-assert (re-search-forward "beam r1 .*-> apex" nil t))
  (say "renames")
  (wait-for "still stands" (not (messages)))

  (goto-char (point-min))
  (search-forward "node apex")
  (let ((references (xref-backend-references 'eglot "LSP identifier at point.")))
    (cl-assert (>= (length references) 3) nil "%S" references)
    (say "finds references"))

  (goto-char (point-min))
  (re-search-forward "^node A.*$")
  (replace-match "node A=(0,0)m")
  (changed)
  (eglot-format-buffer)
  (goto-char (point-min))
  (cl-assert (re-search-forward "^node A +  ?= (0, 0) m$" nil t) nil "%s" (buffer-string))
  (say "formats")

  (changed)
  (goto-char (point-min))
  (search-forward "support A")
  (backward-char)
  (let ((found (xref-backend-definitions 'eglot "LSP identifier at point.")))
    (cl-assert (= (xref-location-line (xref-item-location (car found)))
                  (save-excursion (goto-char (point-min)) (re-search-forward "^node A") (line-number-at-pos)))))
  (say "goes to the definition")
  (set-buffer-modified-p nil)
  (eglot-shutdown (eglot-current-server))
  (delete-directory folder t)
  (say "all is well"))
;;; drive.el ends here
