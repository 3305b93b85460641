;;; span-mode.el --- Edit .span models of frames and trusses  -*- lexical-binding: t; -*-

;; Package-Requires: ((emacs "28.1"))
;; SPDX-License-Identifier: Apache-2.0

;;; Commentary:

;; Colours, comments and indentation for .span files, and the language server
;; `spanwright serve' through eglot: (require 'span-mode), then M-x eglot in a
;; model, or (add-hook 'span-mode-hook #'eglot-ensure).

;;; Code:

(defgroup span nil
  "Models of frames and trusses in plain text."
  :group 'languages)

(defcustom span-program "spanwright"
  "The spanwright program."
  :type 'string)

(defconst span--keywords
  '("model" "show" "let" "material" "section" "node" "beam" "bar" "link" "spring" "support" "mass"
    "group" "case" "alternate" "combination" "family" "limit" "use" "part" "place"))

(defconst span--words
  '("of" "at" "to" "from" "by" "under" "over" "on" "or" "about" "along" "across" "down" "up" "local" "only"
    "self-weight"))

(defconst span--options
  '("plane" "space" "fixed" "pinned" "holds" "hinge" "release" "joint" "roll" "offset" "turned" "tension"
    "compression" "plan" "elevation" "pretension" "inertia" "second order" "shear flexible" "gravity"))

(defconst span--kinds
  '("permanent" "imposed" "snow" "wind" "thermal" "settlement" "accidental" "earthquake" "EN1990" "ASCE7"
    "strength" "characteristic" "frequent" "quasi-permanent" "allowable"))

(defconst span--measures
  '("deflection" "drift" "stress" "axial" "shear" "moment" "reaction" "critical factor" "frequency"
    "ux" "uy" "uz" "rx" "ry" "rz" "Fx" "Fy" "Fz" "Mx" "My" "Mz"))

(defconst span--functions
  '("sqrt" "abs" "min" "max" "sin" "cos" "tan" "asin" "acos" "atan" "atan2" "hypot" "floor" "ceil" "round"))

(defconst span--units
  '("mm" "cm" "km" "m" "in" "ft" "yd" "kNm" "MNm" "Nm" "kN" "MN" "N" "lbf" "kipft" "kipin" "lbft" "kip"
    "GPa" "MPa" "kPa" "Pa" "psi" "ksi" "psf" "ksf" "plf" "klf" "kg" "lb" "t" "Hz" "s" "K" "mrad" "rad" "deg"))

(defconst span-font-lock-keywords
  `((,(concat "^\\s-*" (regexp-opt span--keywords 'words) "\\(?:\\s-+\\([[:alpha:]_][[:alnum:]_.]*\\)\\)?")
     (1 font-lock-keyword-face) (2 font-lock-variable-name-face nil t))
    (,(concat "\\(?:^\\|[^[:alnum:]_.]\\)\\([0-9]+\\(?:\\.[0-9]*\\)?\\(?:[eE][-+]?[0-9]+\\)?\\)\\(?:\\s-*\\(\\(?:"
              (regexp-opt span--units) "\\)[2-6²³⁴⁵⁶]?\\_>\\|%\\)\\)?")
     (1 font-lock-constant-face) (2 font-lock-builtin-face nil t))
    (,(regexp-opt span--words 'symbols) . font-lock-keyword-face)
    (,(regexp-opt span--options 'symbols) . font-lock-builtin-face)
    (,(regexp-opt span--kinds 'symbols) . font-lock-type-face)
    (,(regexp-opt span--measures 'symbols) . font-lock-type-face)
    (,(regexp-opt span--functions 'symbols) . font-lock-function-name-face)
    (,(regexp-opt '("pi" "length" "yield") 'symbols) . font-lock-constant-face))
  "Colours of `span-mode'.")

(defvar span-mode-syntax-table
  (let ((table (make-syntax-table)))
    (modify-syntax-entry ?# "<" table)
    (modify-syntax-entry ?\n ">" table)
    (modify-syntax-entry ?\" "\"" table)
    (modify-syntax-entry ?_ "_" table)
    (modify-syntax-entry ?{ "(}" table)
    (modify-syntax-entry ?} "){" table)
    table)
  "Syntax of `span-mode'.")

(defun span-indent-line ()
  "Indent a line by the blocks around it."
  (interactive)
  (let* ((closing (save-excursion (back-to-indentation) (eq (char-after) ?})))
         (depth (save-excursion (back-to-indentation) (car (syntax-ppss))))
         (column (* 4 (max 0 (if closing (1- depth) depth)))))
    (if (<= (current-column) (current-indentation))
        (indent-line-to column)
      (save-excursion (indent-line-to column)))))

;;;###autoload
(define-derived-mode span-mode prog-mode "Span"
  "Edit models of frames and trusses."
  (setq-local comment-start "# "
              comment-start-skip "#+\\s-*"
              indent-tabs-mode nil
              tab-width 4
              indent-line-function #'span-indent-line
              compile-command (concat span-program " check " (if buffer-file-name (shell-quote-argument (file-name-nondirectory buffer-file-name)) ""))
              font-lock-defaults '(span-font-lock-keywords)))

;;;###autoload
(add-to-list 'auto-mode-alist '("\\.span\\'" . span-mode))

(defvar eglot-server-programs)
(with-eval-after-load 'eglot
  (add-to-list 'eglot-server-programs (cons 'span-mode (lambda (&rest _) (list span-program "serve")))))

(provide 'span-mode)
;;; span-mode.el ends here
